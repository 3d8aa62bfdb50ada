import { spawn } from 'node:child_process';

/**
 * Run a command in silence: what it says is shown (on standard error) only when it fails.
 * @returns {Promise<string>} what it said
 */
export function quietRun(command, args, { cwd, env = process.env } = {}) {
  return new Promise((resolve, reject) => {
    const child = spawn(command, args, { cwd, env, stdio: ['ignore', 'pipe', 'pipe'] });
    const said = [];
    child.stdout.on('data', (chunk) => said.push(chunk));
    child.stderr.on('data', (chunk) => said.push(chunk));
    child.once('error', reject);
    child.once('close', (code, signal) => {
      const text = Buffer.concat(said).toString('utf8');
      if (code === 0) resolve(text);
      else reject(new Error(`${command} ${args.join(' ')} failed (${signal ?? `exit ${code}`}):\n${text}`));
    });
  });
}
