import { text } from 'node:stream/consumers';
import { type StepAnswer, readStepRequest } from './step-messages';
import { SolidBuildError, buildSolid } from './build-solid';
import { measureSolid } from './measure-solid';
import { openCascade } from './open-cascade';
import { writeStep } from './write-step';

/** Reads requests from standard input, answers on standard output and ends: the modeller's memory goes with the process. */
async function main(): Promise<void> {
  const { solids, stamp } = readStepRequest(await text(process.stdin));
  const oc = await openCascade();
  const answers = solids.map(({ name, plan }): StepAnswer => {
    const began = performance.now();
    try {
      const solid = buildSolid(oc, plan);
      const builtInMs = performance.now() - began;
      const step = writeStep(oc, solid, name, stamp);
      return { ok: true, step, measures: measureSolid(oc, solid), builtInMs };
    } catch (error) {
      if (error instanceof SolidBuildError) return { ok: false, reason: error.message };
      // What the modeller throws is a number that stands for an exception of its own.
      const reason = error instanceof Error ? error.message : 'The solid modeller gave up.';
      return { ok: false, reason };
    }
  });
  process.stdout.write(JSON.stringify(answers));
}

void main();
