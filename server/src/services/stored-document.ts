import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { upgradeDocument } from '@foldwright/shared/part/upgrades/upgrade-document';
import * as z from 'zod/mini';

/** A `PartDocument` as the wire carries it: the same members, not marked readonly. */
export type StoredDocument = z.output<typeof partDocumentSchema>;

/**
 * A part document as it was stored, brought up to the current version and checked.
 * @throws Error when it can't be read: the database then holds what no version of this program wrote
 */
export function readStoredDocument(stored: unknown): StoredDocument {
  const upgraded = upgradeDocument(stored);
  if (!upgraded.ok) throw new Error(upgraded.reason);
  return z.parse(partDocumentSchema, upgraded.document);
}
