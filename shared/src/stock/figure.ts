/**
 * How far a tabled value can be trusted. `published`: the named standard or handbook states it; `common-practice`: a
 * rule of the trade without a source; `memory`: recalled, to be checked before anybody relies on it.
 */
export type TableConfidence = 'published' | 'common-practice' | 'memory';

/** Where a row of a table comes from. */
export interface TableSource {
  readonly source: string;
  readonly confidence: TableConfidence;
}

/** A tabled number with its source. The unit stands in the name of the field that holds it. */
export interface Figure extends TableSource {
  readonly value: number;
}

/** A number the named source states. */
export function published(value: number, source: string): Figure {
  return { value, source, confidence: 'published' };
}

/** A number shops go by, without a source. */
export function commonPractice(value: number, source = 'common practice, no source'): Figure {
  return { value, source, confidence: 'common-practice' };
}

/** A number written down from memory; the screen says so. */
export function fromMemory(value: number, source: string): Figure {
  return { value, source, confidence: 'memory' };
}
