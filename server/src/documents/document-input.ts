import type { Development } from '@foldwright/shared/bending/development';
import type { Making, PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import type { Finding } from '@foldwright/shared/rules/finding';

/** Everything a document shows about one part made from one stock. Documents compute nothing of their own. */
export interface DocumentInput {
  readonly partName: string;
  readonly partNumber: string;
  readonly revisionLetter: string;
  readonly isDraft: boolean;
  /** SHA-256 of the release; null for a draft. */
  readonly hash: string | null;
  /** ISO 8601; null for a draft. */
  readonly releasedAt: string | null;
  readonly releasedBy: string | null;
  readonly workshopName: string;
  readonly role: StockRole;
  readonly document: PartDocument;
  readonly development: Development;
  readonly findings: readonly Finding[];
  readonly statement: Making['statement'];
}

/** Date that stands in a file. A draft has none of its own, so it carries the epoch: equal input gives equal bytes. */
export const documentDate = (input: DocumentInput): Date => new Date(input.releasedAt ?? 0);

/** "Mild steel 1.5" as people say it in a shop. */
export const stockWords = (input: DocumentInput): string =>
  `${input.development.stock.materialName}, ${input.development.stock.thicknessMm.toFixed(1)} mm`;

/** "B" or "B draft". */
export const revisionWords = (input: DocumentInput): string =>
  input.isDraft ? `draft of ${input.revisionLetter}` : `revision ${input.revisionLetter}`;
