// Which files of which npm packages stand in web/vendor, byte for byte.

import { existsSync, readdirSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { fileURLToPath } from 'node:url';

const here = dirname(fileURLToPath(import.meta.url));
export const packagesFolder = join(here, 'node_modules');
export const vendorFolder = join(here, '..', '..', 'web', 'vendor');

const directives = ['class-map', 'guard', 'if-defined', 'keyed', 'live', 'ref', 'repeat'].map((name) => `directives/${name}.js`);

/** @type {Record<string, string[]>} */
export const vendored = {
  '@kurkle/color': ['LICENSE.md', 'package.json', 'dist/color.esm.js'],
  '@lit/reactive-element': ['LICENSE', 'package.json', 'reactive-element.js', 'css-tag.js'],
  'chart.js': ['LICENSE.md', 'package.json', 'dist/chart.js', 'dist/chunks/index.js'],
  lit: ['LICENSE', 'package.json', 'index.js', ...directives],
  'lit-element': ['LICENSE', 'package.json', 'lit-element.js'],
  'lit-html': ['LICENSE', 'package.json', 'lit-html.js', 'is-server.js', 'directive.js', 'directive-helpers.js', 'async-directive.js', ...directives],
};

/** The files of the table, as paths under both folders. */
export function vendoredFiles() {
  return Object.entries(vendored).flatMap(([name, files]) => files.map((file) => join(name, file))).sort();
}

/** The files that stand in web/vendor, as paths under it. */
export function filesThere() {
  if (!existsSync(vendorFolder))
    return [];
  return readdirSync(vendorFolder, { withFileTypes: true, recursive: true })
    .filter((entry) => entry.isFile())
    .map((entry) => relative(vendorFolder, join(entry.parentPath ?? entry.path, entry.name)))
    .sort();
}
