import { readEnvironment } from './env';
import { visionReader } from './jobs/vision-reader';
import { openLog, runProcess } from './process';
import { startWorkerProcess } from './worker-process';

void runProcess(async () => {
  const env = readEnvironment();
  const logger = openLog(env.logLevel, 'worker');
  const reader = visionReader();
  const worker = await startWorkerProcess(env, logger, reader);
  const stop = async (): Promise<void> => {
    await worker.stop();
    reader.close();
  };
  return { logger, stop };
});
