import type passport from 'passport';
import type { Logger } from 'pino';
import type { CuttingService } from './cutting/cutting-service';
import type { Database } from './database/database';
import type { LiveHub } from './events/live-hub';
import type { FileStore } from './files/file-store';
import type { RateLimits } from './http/rate-limit';
import type { Queue } from './jobs/queue';
import type { PaymentHost } from './payments/payment-host';

/** What the routes work with. Made once by the process, handed down; nothing below reaches for a global. */
export interface AppDependencies {
  readonly database: Database;
  readonly queue: Queue;
  readonly files: FileStore;
  readonly hub: LiveHub;
  readonly payments: PaymentHost;
  readonly cutting: CuttingService;
  readonly logger: Logger;
  readonly limits: RateLimits;
  readonly authenticator: passport.Authenticator;
  /** Where people reach this installation, without a slash at the end. */
  readonly publicUrl: string;
  /** Now; handed in so that tests can choose. */
  readonly now: () => Date;
}
