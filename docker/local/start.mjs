// What `npm start` runs: plain JavaScript, since nothing is installed yet on a fresh machine.
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
const { debianPackageIsThere, ensureDebianPackage } = await import('./setup/debian-packages.mjs');
const { stepPrinter } = await import('./setup/step-line.mjs');

const printer = stepPrinter();
const realtime = path.join(root, 'realtime/server');
const missing = [
  {
    name: 'Debian packages',
    there: debianPackageIsThere('postgresql'),
    doing: 'installing postgresql',
    install: () => ensureDebianPackage('postgresql'),
  },
  {
    name: 'npm packages',
    there: packagesAreCurrent(root),
    doing: 'installing about 1,100 of them',
    install: () => ensurePackages(root),
  },
  {
    name: 'realtime package',
    there: packagesAreCurrent(realtime),
    doing: 'installing',
    install: () => ensurePackages(realtime),
  },
].filter(({ there }) => !there);

// Side by side; whatever can be installed is, before the first failure is told.
const results = await Promise.allSettled(
  missing.map(({ name, doing, install }) => printer.longStep(name, doing, install, () => 'installed')),
);
const failure = results.find(({ status }) => status === 'rejected');
if (failure) {
  console.error(`\n${failure.reason.message}`);
  process.exit(1);
}

const { register } = await import('tsx/esm/api');
register();
const { runLocal } = await import('./run-local.ts');
process.exit(await runLocal(process.argv.slice(2), printer));
