// What index.html preloads: exactly the modules that the start page comes to by its imports, so that they are fetched at
// once and not one behind the other.

import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { dirname, join, normalize } from 'node:path';
import test from 'node:test';
import { fileURLToPath } from 'node:url';

const web = fileURLToPath(new URL('../../web/', import.meta.url));
const index = readFileSync(join(web, 'index.html'), 'utf8');
const map = JSON.parse(/<script type="importmap">([^<]*)<\/script>/.exec(index)[1]).imports;

function resolve(specifier, from) {
  if (specifier.startsWith('.'))
    return normalize(join(dirname(from), specifier));
  const name = Object.keys(map).filter((key) => specifier === key || (key.endsWith('/') && specifier.startsWith(key))).sort((a, b) => b.length - a.length)[0];
  assert.ok(name, `The import map does not know ${specifier}, which ${from} imports.`);
  return (map[name] + specifier.slice(name.length)).replace('/a/{version}/', '');
}

function importsOf(file) {
  const text = readFileSync(join(web, file), 'utf8').replace(/\/\*[\s\S]*?\*\//g, '').replace(/^\s*\/\/.*$/gm, '');
  return [...text.matchAll(/(?:^|[;\n}])\s*(?:import|export)\s*(?:[\w*{}\s,$]*?\bfrom\s*)?["']([^"']+)["']/g)].map(([, specifier]) => resolve(specifier, file));
}

function reached(files, seen = new Set()) {
  for (const file of files) {
    if (!seen.has(file)) {
      seen.add(file);
      reached(importsOf(file), seen);
    }
  }

  return seen;
}

test('Every module that is imported stands in the tree', () => {
  assert.ok(reached(['app.js', 'pages/lots.js']).size > 20);
});

test('The shell preloads what the start page imports, and nothing else', () => {
  const preloaded = [...index.matchAll(/rel="modulepreload" href="\/a\/\{version\}\/([^"]+)"/g)].map(([, file]) => file);
  const wanted = [...reached(['app.js', 'pages/lots.js'])].filter((file) => file !== 'app.js').sort();
  assert.deepEqual(preloaded.sort(), wanted);
});
