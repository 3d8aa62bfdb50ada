import type { ShopListing } from '@foldwright/shared/contracts/storefront';
import type { Hand } from '@foldwright/shared/contracts/stock';
import { computedPartSchema } from '@foldwright/shared/contracts/development-schema';
import * as z from 'zod/mini';
import type { WorkshopScope } from '../../database/workshop-scope';
import type { Listing } from '../../models/listing';
import { pieceName } from '../sales/piece-words';
import { linesOfKit } from '../stock/kits';
import { readStoredDocument } from '../stored-document';
import type { StockTarget } from '../stock/shelf';
import { findPosition } from '../stock/shelf';

/** One thing in what a listing sells, frozen with its revision. */
export type ListedPiece =
  | {
      readonly kind: 'bracket';
      readonly revisionId: string;
      readonly partId: string;
      readonly partName: string;
      readonly partNumber: string;
      readonly letter: string;
      readonly hash: string;
      readonly hand: Hand;
      /** Null when the customer chooses. */
      readonly finishId: string | null;
      readonly quantity: number;
    }
  | {
      readonly kind: 'hardware';
      readonly hardwareId: string;
      readonly name: string;
      readonly specification: string;
      readonly quantity: number;
    };

const NOTHING = {
  ...{ partName: null, letter: null, hand: null, finishId: null },
  ...{ hardwareName: null, hardwareSpecification: null },
} as const;

async function bracketPiece(
  scope: WorkshopScope,
  revisionId: string,
  finishId: string | null,
  quantity: number,
): Promise<ListedPiece> {
  const revision = await scope.rows.revisions.get(revisionId);
  const part = await scope.rows.parts.get(revision.partId);
  const { letter, hash, hand } = revision;
  return {
    ...{ kind: 'bracket', revisionId, letter, hash, hand, finishId, quantity },
    ...{ partId: part.id, partName: part.name, partNumber: part.number },
  };
}

async function hardwarePiece(scope: WorkshopScope, hardwareId: string, quantity: number): Promise<ListedPiece> {
  const { name, specification } = await scope.rows.hardwareItems.get(hardwareId);
  return { kind: 'hardware', hardwareId, name, specification, quantity };
}

/** What one of a listing consists of: a bracket with the hardware of its part, or what is in the kit. */
export async function piecesOf(scope: WorkshopScope, listing: Listing): Promise<readonly ListedPiece[]> {
  const pieces: ListedPiece[] = [];
  if (listing.kitId !== null) {
    for (const { revisionId, hardwareId, finishId, quantity } of await linesOfKit(scope, listing.kitId)) {
      if (revisionId !== null) pieces.push(await bracketPiece(scope, revisionId, finishId, quantity));
      if (hardwareId !== null) pieces.push(await hardwarePiece(scope, hardwareId, quantity));
    }
    return pieces;
  }
  if (listing.revisionId === null) throw new Error(`listing ${listing.id} sells nothing`);
  const bracket = await bracketPiece(scope, listing.revisionId, null, 1);
  pieces.push(bracket);
  const partId = bracket.kind === 'bracket' ? bracket.partId : '';
  for (const row of await scope.rows.partHardware.list({ where: { partId }, order: [['id', 'ASC']] })) {
    pieces.push(await hardwarePiece(scope, row.hardwareId, row.quantity));
  }
  return pieces;
}

/** A piece in words, with how many are in one of the listing: "2 × Pump tray, revision D, powder coat, moss". */
export function pieceWords(piece: ListedPiece, chosenFinishId: string): string {
  const named =
    piece.kind === 'hardware'
      ? { ...NOTHING, hardwareName: piece.name, hardwareSpecification: piece.specification }
      : { ...NOTHING, ...piece, finishId: piece.finishId ?? chosenFinishId };
  return `${piece.quantity} × ${pieceName(named)}`;
}

/** Where a piece lies on the shelf when the customer has chosen a finish. */
export const targetOfPiece = (piece: ListedPiece, chosenFinishId: string): StockTarget =>
  piece.kind === 'hardware'
    ? { kind: 'hardware', hardwareId: piece.hardwareId }
    : { kind: 'bracket', revisionId: piece.revisionId, finishId: piece.finishId ?? chosenFinishId };

/** How many of a listing what is free on the shelf makes, in one finish. */
export async function freeOnShelf(
  scope: WorkshopScope,
  pieces: readonly ListedPiece[],
  finishId: string,
): Promise<number> {
  const needs = new Map<string, { readonly free: number; readonly quantity: number }>();
  for (const piece of pieces) {
    const target = targetOfPiece(piece, finishId);
    const key = JSON.stringify(target);
    const position = await findPosition(scope, target);
    const free = position === null ? 0 : position.onHand - position.reserved;
    needs.set(key, { free, quantity: (needs.get(key)?.quantity ?? 0) + piece.quantity });
  }
  return Math.min(...[...needs.values()].map(({ free, quantity }) => Math.floor(free / quantity)));
}

/** A piece as customers see it, with what to draw. */
export async function showPiece(scope: WorkshopScope, piece: ListedPiece): Promise<ShopListing['pieces'][number]> {
  if (piece.kind === 'hardware') {
    const { kind, name, specification, quantity } = piece;
    return { kind, name, specification, quantity };
  }
  const revision = await scope.rows.revisions.get(piece.revisionId);
  const { stockLabel, development } = z.parse(computedPartSchema, revision.computedProduction);
  const box = development?.formedBox;
  const { kind, letter, hash, hand, finishId, quantity } = piece;
  return {
    ...{ kind, name: piece.partName, number: piece.partNumber, letter, hash, hand, finishId, quantity },
    document: readStoredDocument(revision.document),
    materialLabel: stockLabel,
    sizeMm:
      box === undefined
        ? { x: 0, y: 0, z: 0 }
        : { x: box.max.x - box.min.x, y: box.max.y - box.min.y, z: box.max.z - box.min.z },
  };
}
