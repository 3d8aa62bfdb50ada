import { readEnvironment } from './env';
import type { ReadsPhotos } from './jobs/photo-reader-port';
import { openLog, runProcess } from './process';
import { PhotoReader } from './vision/photo-reader';
import { startWorkerProcess } from './worker-process';

void runProcess(async () => {
  const env = readEnvironment();
  const logger = openLog(env.logLevel, 'worker');
  const photos = new PhotoReader();
  const reader: ReadsPhotos = {
    read: (bytes, facts, { onStage, signal }) =>
      photos.read(
        bytes,
        { thicknessMm: facts.templateThicknessMm, printScale: [facts.printScaleX, facts.printScaleY] },
        { onStage, signal },
      ),
  };
  const worker = await startWorkerProcess(env, logger, reader);
  const stop = async (): Promise<void> => {
    await worker.stop();
    photos.close();
  };
  return { logger, stop };
});
