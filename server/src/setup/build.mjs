// Builds what has changed since it was last built.
import { buildServer, buildWeb } from './bundle.mjs';
import { ensurePackages } from './packages.mjs';
import { ROOT } from './places.mjs';
import { quietRun } from './quiet-run.mjs';

const steps = [
  ['packages', () => ensurePackages((command, args) => quietRun(command, args, { cwd: ROOT }))],
  ['server', () => buildServer(quietRun)],
  ['web application', () => buildWeb(quietRun)],
];

for (const [name, step] of steps) {
  const began = performance.now();
  try {
    const isNew = await step();
    const seconds = ((performance.now() - began) / 1000).toFixed(1);
    process.stdout.write(`${name}: ${isNew ? `made in ${seconds} s` : 'up to date'}\n`);
  } catch (error) {
    process.stderr.write(`${error.message}\n`);
    process.exit(1);
  }
}
