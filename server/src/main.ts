import { readEnvironment } from './env';
import { openLog, runProcess } from './process';
import { startWebProcess } from './web-process';

void runProcess(async () => {
  const env = readEnvironment();
  const logger = openLog(env.logLevel, 'web');
  return { logger, ...(await startWebProcess(env, logger)) };
});
