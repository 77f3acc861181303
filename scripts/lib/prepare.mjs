/**
 * What must hold before any TypeScript runs: a recent Node, and the packages of package-lock.json.
 * Plain JavaScript without dependencies, because it runs on a fresh clone.
 */
import { spawn } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
const LEAST_NODE = [20, 19, 4];

/** Checks Node, installs packages where they differ from the lock file; answers a `require` that reads TypeScript. */
export async function prepare() {
  process.chdir(ROOT);
  requireNode(process.versions.node);
  if (!packagesMatch()) await installPackages();
  await import('tsx');
  return createRequire(path.join(ROOT, 'scripts/'));
}

function requireNode(version) {
  const [major, minor, patch] = version.split('.').map(Number);
  const [leastMajor, leastMinor, leastPatch] = LEAST_NODE;
  const older =
    major !== leastMajor
      ? major < leastMajor
      : minor !== leastMinor
        ? minor < leastMinor
        : patch < leastPatch;
  if (older) {
    console.error(`Driftwright needs Node ${LEAST_NODE.join('.')} or newer; this is Node ${version}.`);
    process.exit(1);
  }
}

/** npm writes its own record of what it installed last, when it is done: that record must agree with the lock file. */
function packagesMatch() {
  const record = path.join(ROOT, 'node_modules/.package-lock.json');
  if (!existsSync(record)) return false;
  const wanted = packagesIn(path.join(ROOT, 'package-lock.json'));
  const installed = packagesIn(record);
  const agree = ([name, entry]) =>
    installed[name] ? installed[name].version === entry.version : Boolean(entry.optional);
  return (
    Object.entries(wanted).every(([name, entry]) => name === '' || agree([name, entry])) &&
    Object.keys(installed).every((name) => name in wanted)
  );
}

const packagesIn = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;

/** Ends this process with a sentence when npm fails. */
async function installPackages() {
  console.log('Installing packages (one to three minutes) …');
  const npm = process.env.npm_execpath;
  const words = ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'];
  const child = npm
    ? spawn(process.execPath, [npm, ...words], { cwd: ROOT, stdio: 'inherit' })
    : spawn('npm', words, { cwd: ROOT, stdio: 'inherit' });
  const signals = ['SIGINT', 'SIGTERM', 'SIGHUP'];
  const pass = (signal) => child.kill(signal);
  for (const signal of signals) process.on(signal, pass);
  const status = await new Promise((resolve) => {
    child.once('error', () => resolve(127));
    child.once('exit', (code, signal) => resolve(signal ? 130 : code));
  });
  for (const signal of signals) process.off(signal, pass);
  if (status !== 0) {
    console.error(`Installing the packages failed ("npm ci" ended with ${status}); see above.`);
    process.exit(1);
  }
}
