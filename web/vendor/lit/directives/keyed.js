export*from"lit-html/directives/keyed.js";
//# sourceMappingURL=keyed.js.map
