// Debian packages the product and its tests stand on.
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import { findPrograms } from './cluster.mjs';

/** What is looked for on disk, and the package that brings it. */
const PRODUCT = [{ package: 'postgresql', isThere: () => findPrograms() !== undefined }];
const TESTS = [
  { package: 'chromium', isThere: () => fs.existsSync('/usr/bin/chromium') },
  { package: 'qpdf', isThere: () => fs.existsSync('/usr/bin/qpdf') },
  { package: 'poppler-utils', isThere: () => fs.existsSync('/usr/bin/pdftoppm') },
  { package: 'python3-ezdxf', isThere: () => fs.existsSync('/usr/lib/python3/dist-packages/ezdxf') },
  { package: 'python3-shapely', isThere: () => fs.existsSync('/usr/lib/python3/dist-packages/shapely') },
];

/** Packages are missing and this account may not install them. */
export class MissingPackagesError extends Error {
  constructor(missing) {
    super(`Debian packages are missing. Install them with:\n\n  apt-get install --yes ${missing.join(' ')}\n`);
    this.name = 'MissingPackagesError';
  }
}

function aptGet(args) {
  const options = ['-o', 'DPkg::Lock::Timeout=300', '-o', 'Dpkg::Options::=--force-confold'];
  const result = spawnSync('apt-get', [...options, ...args], {
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
    stdio: ['ignore', 'pipe', 'pipe'],
    encoding: 'utf8',
    maxBuffer: 100_000_000,
  });
  if (result.error || result.status !== 0) {
    const said = `${result.stdout ?? ''}${result.stderr ?? ''}`.trim().split('\n').slice(-15).join('\n');
    throw new Error(`apt-get ${args.join(' ')} failed:\n${said}`);
  }
}

/**
 * Install what is missing.
 * @returns {string[]} the packages installed; usually none
 * @throws {MissingPackagesError} when something is missing and this account is not root
 */
export function ensureDebianPackages({ forTests = false, needsDatabase = true } = {}) {
  const wanted = [...(needsDatabase ? PRODUCT : []), ...(forTests ? TESTS : [])];
  const missing = wanted.filter(({ isThere }) => !isThere()).map((each) => each.package);
  if (missing.length === 0) return [];
  if (process.getuid() !== 0) throw new MissingPackagesError(missing);
  const settings = '/etc/postgresql-common/createcluster.conf';
  if (missing.includes('postgresql') && !fs.existsSync(settings)) {
    // Without this, installing the package also makes a cluster on port 5432 and starts it.
    fs.mkdirSync('/etc/postgresql-common', { recursive: true });
    fs.writeFileSync(settings, 'create_main_cluster = false\n');
  }
  aptGet(['update']);
  aptGet(['install', '--yes', '--no-install-recommends', ...missing]);
  return missing;
}
