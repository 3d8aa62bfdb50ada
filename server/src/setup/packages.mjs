// npm packages: installed when absent or when the lock file asks for others.
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { ROOT } from './places.mjs';

const STAMP = path.join(ROOT, 'node_modules', '.foldwright-lock');

const wantedStamp = () =>
  createHash('sha256')
    .update(fs.readFileSync(path.join(ROOT, 'package-lock.json')))
    // Packages with compiled parts are made for one version of Node.
    .update(process.versions.modules)
    .digest('hex');

/** Whether node_modules is what the lock file describes: our stamp says so, or npm's own record of the tree does. */
export function packagesAreStale() {
  if (fs.existsSync(STAMP) && fs.readFileSync(STAMP, 'utf8') === wantedStamp()) return false;
  return !matchesNpmRecord();
}

/** npm writes what it installed into node_modules; a tree somebody else installed needs no second installation. */
function matchesNpmRecord() {
  const record = path.join(ROOT, 'node_modules', '.package-lock.json');
  if (!fs.existsSync(record)) return false;
  const versions = (file) => {
    const { packages } = JSON.parse(fs.readFileSync(file, 'utf8'));
    return Object.entries(packages).filter(([name]) => name !== '');
  };
  const installed = new Map(versions(record).map(([name, { version }]) => [name, version]));
  // Optional packages for other machines stand in the lock file but are rightly not installed.
  return versions(path.join(ROOT, 'package-lock.json')).every(
    ([name, { version, optional }]) => installed.get(name) === version || (optional && !installed.has(name)),
  );
}

/**
 * Bring node_modules up to date.
 * @param {(command: string, args: string[]) => Promise<unknown>} run
 * @returns {Promise<boolean>} whether anything was installed
 */
export async function ensurePackages(run) {
  const isStale = packagesAreStale();
  if (isStale) await run('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error']);
  fs.writeFileSync(STAMP, wantedStamp());
  return isStale;
}
