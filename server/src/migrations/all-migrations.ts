import { foundation } from './20261201-0100-foundation';
import { partsAndPhotos } from './20261201-0200-parts-and-photos';
import { ordersAndMail } from './20261201-0300-orders-and-mail';
import { stockAndKits } from './20261201-0400-stock-and-kits';
import { shopAndSales } from './20261201-0500-shop-and-sales';
import { invitations } from './20261201-0600-invitations';
import { failedMessages } from './20261201-0700-failed-messages';
import { reviews } from './20261201-0800-reviews';
import { solids } from './20261201-0900-solids';
import type { Migration } from './migration';

/** Every step of the schema in order. A list rather than a folder, so that it survives bundling. */
export const ALL_MIGRATIONS: readonly Migration[] = [
  foundation,
  partsAndPhotos,
  ordersAndMail,
  stockAndKits,
  shopAndSales,
  invitations,
  failedMessages,
  reviews,
  solids,
];
