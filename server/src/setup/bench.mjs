// Runs the measurements: every file in test/bench, or those whose names hold the words given.
import { spawnSync } from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import { ensurePackages } from './packages.mjs';
import { ROOT } from './places.mjs';
import { quietRun } from './quiet-run.mjs';

await ensurePackages((command, args) => quietRun(command, args, { cwd: ROOT }));
const folder = path.join(ROOT, 'test/bench');
const words = process.argv.slice(2);
const files = fs.existsSync(folder) ? fs.readdirSync(folder).filter((name) => name.endsWith('.bench.ts')) : [];
const chosen = files.filter((name) => words.length === 0 || words.some((word) => name.includes(word))).sort();
if (chosen.length === 0) process.stdout.write('There is nothing to measure.\n');
for (const name of chosen) {
  process.stdout.write(`\n${name}\n`);
  const result = spawnSync('node_modules/.bin/tsx', ['--tsconfig', 'test/tsconfig.json', path.join(folder, name)], {
    cwd: ROOT,
    stdio: 'inherit',
  });
  if (result.status !== 0) process.exitCode = 1;
}
