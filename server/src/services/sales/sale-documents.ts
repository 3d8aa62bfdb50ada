import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import { addressSchema } from '@foldwright/shared/contracts/storefront';
import { developPart } from '@foldwright/shared/part/develop-part';
import type { DeclaredUse } from '@foldwright/shared/part/part-document';
import { findFinish } from '@foldwright/shared/stock/finishes';
import * as z from 'zod/mini';
import type { Database } from '../../database/database';
import type { WorkshopScope } from '../../database/workshop-scope';
import { cautionsForBuyers } from '../../documents/cautions';
import { makeFittingSheet } from '../../documents/sale/fitting-sheet';
import { makeInvoice } from '../../documents/sale/invoice';
import { makePackingSlip } from '../../documents/sale/packing-slip';
import type { DocumentPiece, SaleHead } from '../../documents/sale/sale-document';
import type { FileAnswer } from '../../http/file-answer';
import { Problem, notFound } from '../../http/problem';
import type { Member } from '../../http/visitor';
import type { Sale } from '../../models/sale';
import type { SaleItem } from '../../models/sale-item';
import { shopOf } from '../shop/settings';
import { readStoredDocument } from '../stored-document';
import { findSaleByLink } from './find-by-link';
import { finishWords } from './piece-words';
import { shortOf } from './reserve';
import { readSaleFacts } from './sale-rows';

const pdf = (bytes: Buffer, fileName: string): FileAnswer => ({
  bytes,
  contentType: 'application/pdf',
  fileName,
  disposition: 'inline',
  isImmutable: false,
});

async function headOf(scope: WorkshopScope, sale: Sale): Promise<SaleHead> {
  const workshop = await scope.workshop();
  const { name, street, more, postcode, city, country } = z.parse(addressSchema, sale.address);
  return {
    shopName: workshop.name,
    senderAddress: (await shopOf(scope)).senderAddress,
    saleNumber: sale.number,
    placedAt: sale.placedAt,
    customerLines: [name, street, more, `${postcode} ${city}`, country].filter((line) => line.trim() !== ''),
  };
}

/** A piece with its picture, as it was frozen. */
async function documentPiece(scope: WorkshopScope, item: SaleItem, quantity: number): Promise<DocumentPiece> {
  if (item.revisionId === null) {
    const { hardwareName, hardwareSpecification } = item;
    return { kind: 'hardware', name: hardwareName ?? '', specification: hardwareSpecification ?? '', quantity };
  }
  const revision = await scope.rows.revisions.get(item.revisionId);
  const developed = developPart(readStoredDocument(revision.document), 'production');
  if (!developed.ok) throw new Error(`revision ${revision.id} was released and can't be developed`);
  const finishId = item.finishId ?? 'bare';
  return {
    kind: 'bracket',
    name: item.partName ?? '',
    number: item.partNumber ?? '',
    letter: item.letter ?? '',
    hash: item.hash ?? '',
    hand: item.hand ?? 'either',
    finishName: finishWords(finishId),
    finishHex: findFinish(finishId)?.colourHex ?? null,
    materialLabel: z.parse(computedPartSchema, revision.computedProduction).stockLabel,
    development: developed.development,
    quantity,
  };
}

const itemsOf = (scope: WorkshopScope, saleId: string): Promise<SaleItem[]> =>
  scope.rows.saleItems.list({ where: { saleId }, order: [['position', 'ASC']] });

/** Packing slip of a parcel. @throws Problem `not-found` */
export function readPackingSlip(
  database: Database,
  { workshopId }: Member,
  saleId: string,
  shipmentId: string,
): Promise<FileAnswer> {
  return database.inWorkshop(workshopId, async (scope) => {
    const sale = await scope.rows.sales.get(saleId);
    const shipment = await scope.rows.shipments.findOne({ id: shipmentId, saleId });
    if (shipment === null) throw notFound();
    const contents = await scope.rows.shipmentItems.list({ where: { shipmentId } });
    const inside: DocumentPiece[] = [];
    const toCome: DocumentPiece[] = [];
    for (const item of await itemsOf(scope, saleId)) {
      const here = contents.find(({ itemId }) => itemId === item.id);
      if (here !== undefined) inside.push(await documentPiece(scope, item, here.quantity));
      const rest = shortOf(item) + item.reserved;
      if (rest > 0) toCome.push(await documentPiece(scope, item, rest));
    }
    const { number, carrier, trackingCode, shippedAt } = shipment;
    const head = await headOf(scope, sale);
    const bytes = await makePackingSlip({ head, parcel: number, carrier, trackingCode, shippedAt, inside, toCome });
    return pdf(bytes, `packing-slip-${sale.number}-${number}.pdf`);
  });
}

async function invoiceOf(scope: WorkshopScope, sale: Sale): Promise<FileAnswer> {
  const paid = (await readSaleFacts(scope, sale.id)).find(({ kind }) => kind === 'paid');
  if (paid === undefined) {
    throw new Problem('wrong-state', {
      detail: `Order ${sale.number} is not paid, so there is no invoice.`,
      next: 'Pay it first.',
    });
  }
  const lines = await scope.rows.saleLines.list({ where: { saleId: sale.id }, order: [['position', 'ASC']] });
  const { currency, postageMinor, taxName, taxBasisPoints, taxMinor, totalMinor, refundedMinor } = sale;
  const bytes = await makeInvoice({
    head: await headOf(scope, sale),
    paidAt: paid.at,
    lines: lines.map(({ title, finishId, quantity, eachMinor, totalMinor: lineMinor, taxMinor: lineTax }) => ({
      words: `${title}, ${finishWords(finishId)}`,
      ...{ quantity, eachMinor, totalMinor: lineMinor, taxMinor: lineTax },
    })),
    taxNumber: (await shopOf(scope)).taxNumber,
    ...{ currency, postageMinor, taxName, taxBasisPoints, taxMinor, totalMinor, refundedMinor },
  });
  return pdf(bytes, `invoice-${sale.number}.pdf`);
}

/** Invoice of a paid sale. @throws Problem `not-found`, `wrong-state` */
export function readInvoice(database: Database, { workshopId }: Member, saleId: string): Promise<FileAnswer> {
  return database.inWorkshop(workshopId, async (scope) => invoiceOf(scope, await scope.rows.sales.get(saleId)));
}

/** The same behind the customer's link. @throws Problem `not-found`, `wrong-state` */
export async function readInvoiceByLink(database: Database, link: string): Promise<FileAnswer> {
  const { workshopId, saleId } = await findSaleByLink(database, link);
  return database.inWorkshop(workshopId, async (scope) => invoiceOf(scope, await scope.rows.sales.get(saleId)));
}

/** Fitting sheet behind the customer's link: cautions, what it is, hardware, steps. @throws Problem `not-found` */
export async function readFittingSheet(database: Database, link: string): Promise<FileAnswer> {
  const { workshopId, saleId } = await findSaleByLink(database, link);
  return database.inWorkshop(workshopId, async (scope) => {
    const sale = await scope.rows.sales.get(saleId);
    const items = await itemsOf(scope, saleId);
    const lines = await scope.rows.saleLines.list({ where: { saleId }, order: [['position', 'ASC']] });
    const parts = [];
    for (const line of lines) {
      const pieces: DocumentPiece[] = [];
      for (const item of items.filter(({ lineId }) => lineId === line.id)) {
        pieces.push(await documentPiece(scope, item, item.perLine));
      }
      const steps = line.fittingSteps.split('\n').filter((step) => step.trim() !== '');
      parts.push({ title: line.title, quantity: line.quantity, pieces, steps });
    }
    const uses: DeclaredUse[] = [];
    for (const { revisionId } of items) {
      if (revisionId === null) continue;
      uses.push(...readStoredDocument((await scope.rows.revisions.get(revisionId)).document).declaredUses);
    }
    const bytes = await makeFittingSheet({ head: await headOf(scope, sale), parts, cautions: cautionsForBuyers(uses) });
    return pdf(bytes, `fitting-sheet-${sale.number}.pdf`);
  });
}
