import { applyCommand } from '../../../part/apply-command';
import type { Assembly } from '../../../part/assembly';
import type { PartDocument } from '../../../part/part-document';

/** Bare, nothing said of a seat, nothing near, no bolts. */
export const NOTHING: Assembly = {
  finishId: 'bare',
  hardwareSet: 'after-coating',
  seat: null,
  neighbours: [],
  bolts: null,
};

/** The document with what is said of its assembly. */
export function assembled(document: PartDocument, said: Partial<Assembly> = {}): PartDocument {
  return applyCommand(document, { kind: 'setAssembly', assembly: { ...NOTHING, ...said } });
}
