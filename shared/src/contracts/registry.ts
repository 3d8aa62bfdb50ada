import * as office from './office';
import * as orders from './orders';
import * as parts from './parts';
import * as photos from './photos';
import * as revisions from './revisions';
import type { RouteContract } from './route';
import * as session from './session';
import * as stock from './stock';
import * as system from './system';

/** Every route of the product. One that is not listed here does not exist. */
export const ROUTE_CONTRACTS: readonly RouteContract[] = [
  session.readSession,
  session.signIn,
  session.signOut,
  session.switchWorkshop,
  session.changeOwnName,
  parts.listParts,
  parts.createPart,
  parts.readPart,
  parts.renamePart,
  parts.startDraft,
  parts.readDraft,
  parts.sendCommands,
  parts.readDraftHistory,
  parts.computeDraft,
  parts.printDraft,
  parts.releaseDraft,
  photos.uploadPhoto,
  photos.readPhoto,
  photos.readPhotoImage,
  photos.rereadPhoto,
  photos.readScaleSheet,
  photos.readJob,
  photos.stopJob,
  photos.retryJob,
  revisions.readRevision,
  revisions.readRevisionFile,
  orders.askForQuote,
  orders.listQuotes,
  orders.placeOrder,
  orders.listOrders,
  orders.readOrder,
  orders.openCheckout,
  orders.cancelOrder,
  orders.receivePaymentEvent,
  orders.receiveCuttingCallback,
  stock.listStock,
  stock.receiveStock,
  stock.adjustStock,
  stock.listStockMoves,
  stock.createHardware,
  stock.changeHardware,
  stock.listKits,
  stock.createKit,
  stock.changeKit,
  stock.listReleasedBrackets,
  stock.listEarnings,
  stock.setPartHardware,
  stock.setPartHand,
  stock.makeOtherHand,
  office.listMails,
  office.listMembers,
  office.listAuditTrail,
  office.readInstallation,
  system.readHealth,
  system.readOpenApi,
  system.streamEvents,
];
