import type { Assembly, Mark } from './assembly';
import type { PartDocument } from './part-document';

/** A document with what it meets; null takes it away, so that a document that went there and back is the same. */
export function withAssembly({ assembly: _, ...document }: PartDocument, assembly: Assembly | null): PartDocument {
  return assembly === null ? document : { ...document, assembly };
}

/** A document with these etched texts; none takes the list away. */
export function withMarks({ marks: _, ...document }: PartDocument, marks: readonly Mark[]): PartDocument {
  return marks.length === 0 ? document : { ...document, marks };
}
