// Copies the files of vendored.js out of node_modules into web/vendor. Run it after raising a version in package.json.

import { cpSync, mkdirSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { packagesFolder, vendorFolder, vendoredFiles } from './vendored.js';

rmSync(vendorFolder, { recursive: true, force: true });
for (const file of vendoredFiles()) {
  mkdirSync(dirname(join(vendorFolder, file)), { recursive: true });
  cpSync(join(packagesFolder, file), join(vendorFolder, file));
}
