import { startCuttingService } from './cutting-service/start-cutting-service';
import { runStandIn } from './run-stand-in';

runStandIn(async (settings) => `cutting-service listening on ${(await startCuttingService(settings)).url}`);
