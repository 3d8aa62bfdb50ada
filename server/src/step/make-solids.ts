import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { text } from 'node:stream/consumers';
import { type StepAnswer, type StepRequest, readStepAnswers } from './step-messages';

/** The making of solids broke down: a crash, a time limit. Says nothing about the part. */
export class SolidsFailure extends Error {}

const TIME_LIMIT_MS = 120_000;

/** The bundled program beside this one, or the source with the loader used in development. */
function command(): readonly string[] {
  const bundled = join(__dirname, 'step-worker.cjs');
  if (existsSync(bundled)) return [bundled];
  return ['--require', require.resolve('tsx/cjs'), join(__dirname, 'step-worker.ts')];
}

/**
 * Makes solids and their STEP files in a process of its own, which ends afterwards: native code may crash there, and its memory is given
 * back whatever happens.
 * @throws SolidsFailure when that process breaks down or takes longer than two minutes; trying again may help
 */
export async function makeSolids(request: StepRequest): Promise<readonly StepAnswer[]> {
  // The environment holds passwords, and the modeller needs none of it.
  const env = { TSX_TSCONFIG_PATH: join(__dirname, '..', '..', 'tsconfig.json') };
  const child = spawn(process.execPath, command(), { env, stdio: ['pipe', 'pipe', 'pipe'], timeout: TIME_LIMIT_MS });
  const ended = new Promise<number | null>((resolve, refuse) => {
    child.on('error', refuse);
    child.on('close', resolve);
  });
  // A process that ends early closes its input; what happened is told by its exit.
  child.stdin.on('error', () => undefined);
  child.stdin.end(JSON.stringify(request));
  const [said, complaint, code] = await Promise.all([text(child.stdout), text(child.stderr), ended]);
  if (code !== 0) throw new SolidsFailure(`The solid modeller ended with ${code}: ${complaint.trim().slice(-300)}`);
  return readStepAnswers(said);
}
