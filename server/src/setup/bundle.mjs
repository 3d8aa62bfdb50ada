// Builds the server's programs and the web application, each only when its sources changed.
import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import { ROOT } from './places.mjs';
import { whileLocked } from './processes.mjs';

const DIST = path.join(ROOT, 'dist');

/** The folder of the built programs. */
export const PROGRAMS = path.join(DIST, 'server');

/** The programs of the server, by the name of their bundle. */
const ENTRIES = {
  main: 'server/src/main.ts',
  worker: 'server/src/worker.ts',
  migrate: 'server/src/migrate.ts',
  cli: 'server/src/cli/main.ts',
  'photo-worker': 'server/src/vision/photo-worker.ts',
  'step-worker': 'server/src/step/step-worker.ts',
  'cutting-service': 'server/src/fakes/cutting-service.ts',
  'payment-host': 'server/src/fakes/payment-host.ts',
  'mail-server': 'server/src/fakes/mail-server.ts',
};

const SERVER_SOURCES = ['server', 'shared', 'tsconfig.base.json', 'package-lock.json'];
const WEB_SOURCES = ['projects', 'shared', 'fonts', 'angular.json', 'tsconfig.base.json', 'package-lock.json'];

const isTest = (name) => /\.(test|spec)\.ts$/.test(name);

/** A digest of all source files below the given places, tests left out: times are no guide after a checkout. */
function digestOf(places) {
  const hash = createHash('sha1');
  const walk = (place) => {
    const at = path.join(ROOT, place);
    if (!fs.existsSync(at)) return;
    if (fs.statSync(at).isDirectory()) {
      for (const name of fs.readdirSync(at).sort()) walk(path.join(place, name));
    } else if (!isTest(place)) {
      hash.update(`${place}\0`).update(fs.readFileSync(at)).update('\0');
    }
  };
  places.forEach(walk);
  return hash.digest('hex');
}

const readStamp = (file) => (fs.existsSync(file) ? fs.readFileSync(file, 'utf8') : undefined);

/** Do the work unless the stamp of an earlier time says that the same sources were built. */
async function unlessBuilt(part, sources, product, build) {
  const stamp = path.join(DIST, `${part}.stamp`);
  const isCurrent = () => fs.existsSync(product) && readStamp(stamp) === digestOf(sources);
  if (isCurrent()) return false;
  return whileLocked(path.join(DIST, `${part}.lock`), async () => {
    // Somebody else may have built it while this process waited.
    if (isCurrent()) return false;
    const digest = digestOf(sources);
    fs.rmSync(stamp, { force: true });
    await build();
    fs.writeFileSync(stamp, digest);
    return true;
  });
}

/**
 * Bundle the server's programs into dist/server.
 * @param {(command: string, args: string[], options: object) => Promise<unknown>} run
 * @returns {Promise<boolean>} whether anything had to be built
 */
export function buildServer(run) {
  return unlessBuilt('server', SERVER_SOURCES, PROGRAMS, async () => {
    const entries = Object.entries(ENTRIES).filter(([, source]) => fs.existsSync(path.join(ROOT, source)));
    if (entries.length === 0) throw new Error('There is no program of the server to build.');
    const draft = path.join(DIST, `server-draft-${process.pid}`);
    const options = [
      '--bundle',
      '--packages=external',
      '--platform=node',
      '--target=node20',
      '--format=cjs',
      '--sourcemap',
    ];
    const output = [`--outdir=${draft}`, '--out-extension:.js=.cjs', '--log-level=warning'];
    const inputs = entries.map(([name, source]) => `${name}=${source}`);
    const tsconfig = '--tsconfig=server/tsconfig.json';
    try {
      await run('node_modules/.bin/esbuild', [...inputs, ...options, ...output, tsconfig], { cwd: ROOT });
      // One file at a time takes the place of its predecessor: a program being started finds the old one or the new.
      fs.mkdirSync(PROGRAMS, { recursive: true });
      for (const name of fs.readdirSync(draft)) fs.renameSync(path.join(draft, name), path.join(PROGRAMS, name));
      for (const name of fs.readdirSync(PROGRAMS)) {
        if (!(name.replace(/\.cjs(\.map)?$/, '') in Object.fromEntries(entries))) fs.rmSync(path.join(PROGRAMS, name));
      }
    } finally {
      fs.rmSync(draft, { recursive: true, force: true });
    }
  });
}

/** Build the web application into dist/foldwright; as `buildServer`. */
export function buildWeb(run) {
  return unlessBuilt('web', WEB_SOURCES, path.join(DIST, 'foldwright/browser/index.html'), () =>
    run('node_modules/.bin/ng', ['build', '--progress=false'], {
      cwd: ROOT,
      // What it says ends up in logs and reports, where colours are noise.
      env: { ...process.env, NG_CLI_ANALYTICS: 'false', NO_COLOR: '1', FORCE_COLOR: '0' },
    }),
  );
}

/** Where a program lies once it is built, or undefined when it has no source. */
export function programPath(name) {
  const file = path.join(PROGRAMS, `${name}.cjs`);
  return fs.existsSync(file) ? file : undefined;
}
