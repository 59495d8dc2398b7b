// Compares web/vendor with the packages that npm installed: nobody edits a copy, none is missing and none is left over.

import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { filesThere, packagesFolder, vendorFolder, vendoredFiles } from './vendored.js';

const wanted = vendoredFiles();
const there = filesThere();
const findings = [
  ...wanted.filter((file) => !there.includes(file)).map((file) => `${file} is missing.`),
  ...there.filter((file) => !wanted.includes(file)).map((file) => `${file} is in no row of vendored.js.`),
  ...wanted
    .filter((file) => there.includes(file) && !readFileSync(join(vendorFolder, file)).equals(readFileSync(join(packagesFolder, file))))
    .map((file) => `${file} differs from its package.`),
];

for (const finding of findings)
  console.error(finding);
if (findings.length > 0)
  console.error('Run "npm ci && npm run vendor:copy" in tests/web, and look at what changed.');
else
  console.log(`${wanted.length} vendored files are those of their packages.`);
process.exitCode = findings.length === 0 ? 0 : 1;
