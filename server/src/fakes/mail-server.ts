import { startMailServer } from './mail-server/start-mail-server';
import { runStandIn } from './run-stand-in';

runStandIn(async (settings) => {
  const { smtpPort, url } = await startMailServer(settings);
  return `mail-server listening on smtp://127.0.0.1:${smtpPort}, messages at ${url}`;
});
