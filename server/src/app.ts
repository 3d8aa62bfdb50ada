import type { RouteContract } from '@foldwright/shared/contracts/route';
import type { Express } from 'express';
import express from 'express';
import type { AppDependencies } from './app-dependencies';
import { identifyVisitor } from './http/identify-visitor';
import { rateLimits } from './http/rate-limit';
import { requestLog } from './http/request-log';
import type { BoundRoute } from './http/route-call';
import { securityHeaders } from './http/security-headers';
import { serveRoutes } from './http/serve-routes';
import { sessions } from './http/session';
import { passportFor } from './http/sign-in';
import { serveClient } from './http/static-client';
import { receiveUploads } from './http/upload';
import { refuseUnknownAddress, writeProblems } from './http/write-problem';
import { allRoutes } from './routes/all-routes';

export interface AppOptions extends Omit<AppDependencies, 'limits' | 'authenticator'> {
  readonly sessionSecret: string;
  readonly requestsPerMinute: number;
  /** Folder of the built client; null where only the API is wanted. */
  readonly webDirectory: string | null;
  /** Routes and their contracts, where a test wants others than the product's. */
  readonly routes?: (dependencies: AppDependencies) => readonly BoundRoute[];
  readonly contracts?: readonly RouteContract[];
}

/** The whole web application, ready to be listened on by somebody else. */
export function buildApp(options: AppOptions): Express {
  const { database, logger, publicUrl } = options;
  const publicOrigin = new URL(publicUrl).origin;
  const isSecure = publicUrl.startsWith('https:');
  const limits = rateLimits(database.pool, options.requestsPerMinute);
  const authenticator = passportFor(database);
  const dependencies: AppDependencies = { ...options, limits, authenticator };

  const app = express();
  app.disable('x-powered-by');
  app.set('etag', false);
  // Behind https stands one proxy of the operator's; without it nobody may claim another address.
  app.set('trust proxy', isSecure ? 1 : false);
  app.set('query parser', 'simple');
  app.use(requestLog(logger));
  app.use(securityHeaders(isSecure));
  app.use('/api', async (request, _response, next) => {
    await limits.countRequest(request);
    next();
  });
  app.use('/api', [
    sessions({
      pool: database.pool,
      secret: options.sessionSecret,
      isSecure,
      onStoreError: (error) => logger.error({ err: error }, 'session store'),
    }),
    authenticator.initialize(),
    authenticator.session(),
    identifyVisitor(database),
  ]);
  serveRoutes(app, {
    routes: (options.routes ?? allRoutes)(dependencies),
    ...(options.contracts ? { contracts: options.contracts } : {}),
    publicOrigin,
    receiveUpload: receiveUploads(options.files.incomingDirectory),
  });
  app.use('/api', refuseUnknownAddress);
  if (options.webDirectory !== null) serveClient(app, options.webDirectory);
  app.use(writeProblems(logger));
  return app;
}
