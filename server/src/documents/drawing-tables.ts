import type { BendRow, Development } from '@foldwright/shared/bending/development';
import type { HolePurpose, LengthReference } from '@foldwright/shared/bending/layout';

/** A table of a drawing: upright figures, a second smaller line under a row for where its numbers come from. */
export interface DrawingTable {
  readonly title: string;
  readonly columns: readonly {
    readonly label: string;
    readonly widthMm: number;
    readonly align: 'left' | 'right';
    readonly isWords?: boolean;
  }[];
  readonly rows: readonly { readonly cells: readonly string[]; readonly note: string | null }[];
  /** Said once under the table. */
  readonly foot: string | null;
}

const REFERENCE_WORDS: Readonly<Record<LengthReference, string>> = {
  outsideApex: 'outside apex',
  insideApex: 'inside apex',
  outsideTangent: 'outside tangent',
  insideTangent: 'inside tangent',
  tangent: 'tangent lines',
};

const CONFIDENCE_WORDS = {
  published: 'published',
  'common-practice': 'common practice, no source',
  memory: 'from memory, check before relying on it',
  measured: 'measured here',
  entered: 'entered by hand',
} as const;

const bendNote = (row: BendRow): string => {
  const { text, source, confidence } = row.kProvenance;
  const parts = [`K: ${text}`, source, CONFIDENCE_WORDS[confidence], ...(row.kNote === null ? [] : [row.kNote])];
  const words = parts.filter((part, index) => part !== '' && parts.indexOf(part) === index).join('; ');
  return `${words}. BD to the ${REFERENCE_WORDS[row.deductionReference]}.`;
};

/** A note that an earlier row carries already is said in two words. */
function noteUnlessSame(row: BendRow, earlier: readonly BendRow[]): string {
  const note = bendNote(row);
  const same = earlier.find((one) => bendNote(one) === note);
  return same === undefined ? note : `as ${same.name}`;
}

export function bendTable(development: Development): DrawingTable {
  const references = [...new Set(development.bendTable.map((row) => REFERENCE_WORDS[row.deductionReference]))];
  return {
    title: 'Bends',
    columns: [
      { label: 'Bend', widthMm: 14, align: 'left' },
      { label: 'Way', widthMm: 20, align: 'left' },
      { label: 'Angle', widthMm: 16, align: 'right' },
      { label: 'Included', widthMm: 18, align: 'right' },
      { label: 'Inside R', widthMm: 18, align: 'right' },
      { label: 'K', widthMm: 15, align: 'right' },
      { label: 'BA', widthMm: 18, align: 'right' },
      { label: 'BD', widthMm: 18, align: 'right' },
      { label: 'V-die', widthMm: 16, align: 'right' },
      { label: 'Length', widthMm: 27, align: 'right' },
    ],
    rows: development.bendTable.map((row, index, rows) => ({
      cells: [
        row.name,
        row.direction,
        `${row.bendAngleDeg.toFixed(1)}°`,
        `${(180 - row.bendAngleDeg).toFixed(1)}°`,
        row.insideRadiusMm.toFixed(2),
        row.kFactor.toFixed(3),
        row.bendAllowanceMm.toFixed(3),
        row.bendDeductionMm.toFixed(3),
        row.vOpeningMm.toFixed(0),
        row.bendLengthMm.toFixed(1),
      ],
      note: noteUnlessSame(row, rows.slice(0, index)),
    })),
    foot:
      references.length === 0
        ? 'No bends: this blank stays flat.'
        : 'Angle: turned from flat. BA: bend allowance, length of the bend zone in the blank. BD: bend deduction, what the two legs lose.',
  };
}

const PURPOSE_WORDS = (purpose: HolePurpose): string => {
  switch (purpose.kind) {
    case 'clearance':
      return `${purpose.thread} clearance, ${purpose.fit} (ISO 273)`;
    case 'tapped':
      return `tap ${purpose.thread} after cutting`;
    case 'rivet-nut':
      return `rivet nut ${purpose.thread}`;
    case 'countersunk':
      return `${purpose.thread}, countersink after cutting`;
    case 'pass-through':
      return 'pass-through';
    case 'plain':
      return 'plain';
    case 'lightening':
      return 'lightening';
  }
};

/** Holes and slots from the blank's lower-left corner (of its bounds): where a rule can be laid. */
export function openingTable(development: Development): DrawingTable {
  const { flat } = development;
  const origin = flat.bounds.min;
  const holes = flat.holes.map((hole, index) => ({
    cells: [
      `H${index + 1}`,
      (hole.centre.x - origin.x).toFixed(2),
      (hole.centre.y - origin.y).toFixed(2),
      `Ø ${hole.diameterMm.toFixed(2)}`,
      PURPOSE_WORDS(hole.purpose),
    ],
    note: null,
  }));
  const slots = flat.slots.map((slot, index) => ({
    cells: [
      `S${index + 1}`,
      ((slot.from.x + slot.to.x) / 2 - origin.x).toFixed(2),
      ((slot.from.y + slot.to.y) / 2 - origin.y).toFixed(2),
      `${slot.widthMm.toFixed(2)} × ${(Math.hypot(slot.to.x - slot.from.x, slot.to.y - slot.from.y) + slot.widthMm).toFixed(2)}`,
      'slot, over its ends',
    ],
    note: null,
  }));
  return {
    title: 'Holes and slots in the blank',
    columns: [
      { label: '', widthMm: 14, align: 'left' },
      { label: 'X', widthMm: 24, align: 'right' },
      { label: 'Y', widthMm: 24, align: 'right' },
      { label: 'Size', widthMm: 38, align: 'right' },
      { label: 'For', widthMm: 80, align: 'left' },
    ],
    rows: [...holes, ...slots],
    foot:
      holes.length + slots.length === 0
        ? 'None.'
        : 'X and Y from the lower-left corner of the blank’s extents, face A up.',
  };
}

export function formedSizeTable(development: Development): DrawingTable {
  const { formedBox: box } = development;
  return {
    title: 'Formed sizes to check',
    columns: [
      { label: 'Size', widthMm: 70, align: 'left', isWords: true },
      { label: 'mm', widthMm: 24, align: 'right' },
      { label: 'Spread', widthMm: 22, align: 'right' },
      { label: 'Mostly from', widthMm: 64, align: 'left' },
    ],
    rows: development.formedSizes.map((size) => ({
      cells: [size.label, size.valueMm.toFixed(2), `± ${size.spreadMm.toFixed(2)}`, size.mostlyFrom],
      note: null,
    })),
    foot: `Overall, formed: ${(box.max.x - box.min.x).toFixed(1)} × ${(box.max.y - box.min.y).toFixed(1)} × ${(box.max.z - box.min.z).toFixed(1)}.`,
  };
}
