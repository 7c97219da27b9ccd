// What `npm start` runs: plain JavaScript, since nothing is installed yet on a fresh machine.
import { existsSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const [major, minor] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) {
  console.error(
    `Firstpull needs Node 20.19 or newer; this is Node ${process.versions.node}. Install a newer one.`,
  );
  process.exit(1);
}

const root = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
process.chdir(root);

const { ensurePackages, packagesAreCurrent } = await import('./setup/npm-packages.mjs');
const { ensureDebianPackage, MissingPackageError } = await import('./setup/debian-packages.mjs');
const { stepPrinter } = await import('./setup/step-line.mjs');

const printer = stepPrinter();
try {
  const realtime = path.join(root, 'realtime');
  await printer.longStep('Debian packages', () => ensureDebianPackage('postgresql'), installedOrThere);
  const fresh = !existsSync(path.join(root, 'node_modules'));
  if (fresh) printer.note('First start: this downloads about 1,100 npm packages and builds the application.');
  if (!packagesAreCurrent(root) || !packagesAreCurrent(realtime)) {
    await printer.longStep('npm packages', () => ensurePackages(root), installedOrThere);
    await printer.longStep('realtime package', () => ensurePackages(realtime), installedOrThere);
  }
} catch (error) {
  console.error(error instanceof MissingPackageError ? `\n${error.message}` : `\n${error.message ?? error}`);
  process.exit(1);
}

const { register } = await import('tsx/esm/api');
register();
const { runLocal } = await import('./run-local.ts');
process.exit(await runLocal(process.argv.slice(2), printer));

function installedOrThere(installed) {
  return installed ? 'installed' : 'there';
}
