import { startPaymentHost } from './payment-host/start-payment-host';
import { runStandIn } from './run-stand-in';

runStandIn(async (settings) => `payment-host listening on ${(await startPaymentHost(settings)).url}`);
