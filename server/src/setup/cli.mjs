// The command line: brings packages and the bundle up to date without a word, then hands over.
import { spawn } from 'node:child_process';
import { buildServer, programPath } from './bundle.mjs';
import { ensurePackages } from './packages.mjs';
import { ROOT } from './places.mjs';
import { quietRun } from './quiet-run.mjs';

const inRoot = (command, args) => quietRun(command, args, { cwd: ROOT });

try {
  await ensurePackages(inRoot);
  await buildServer(quietRun);
} catch (error) {
  process.stderr.write(`${error.message}\n`);
  process.exit(1);
}
const program = programPath('cli');
if (program === undefined) {
  process.stderr.write('The command line has not been built: its source is missing.\n');
  process.exit(1);
}
// Files named on the command line are meant from where the caller stands, not from where npm runs its scripts.
const cwd = process.env.INIT_CWD ?? process.cwd();
const child = spawn(process.execPath, [program, ...process.argv.slice(2)], { cwd, stdio: 'inherit' });
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => child.kill(signal));
child.once('exit', (code) => process.exit(code ?? 1));
