// A worker process of the product in all but its reader, which stops for ever at the stage named as its argument: it is
// there to be killed. Without an argument it reads at once.
import pino from 'pino';
import { readEnvironment } from '@foldwright/server/env';
import { startWorkerProcess } from '@foldwright/server/worker-process';
import { ScriptedReader } from './scripted-reader';

const holdsAt = process.argv[2];
const reader = new ScriptedReader(async (stage) => {
  if (stage === holdsAt) await new Promise(() => undefined);
});

startWorkerProcess(readEnvironment(), pino({ level: 'warn' }, pino.destination(2)), reader).then(
  () => process.stdout.write('ready\n'),
  (error: unknown) => {
    process.stderr.write(`${String(error)}\n`);
    process.exit(1);
  },
);
