import type { Provenance } from '../../bending/development';

function practice(text: string): Provenance {
  return { text, source: 'common practice, no source', confidence: 'common-practice' };
}

/** Thread in sheet: fewer full turns strip by hand; below the share of the diameter the thread gives before the bolt. */
export const ENGAGEMENT = {
  fullTurns: 2,
  overDiameter: 0.5,
  softOverDiameter: 1,
  why: practice('two full turns of thread at least, and half a diameter deep (a whole one in soft metals)'),
} as const;

/** What a bolt needs to drop in by hand, mm on the diameter. */
export const BOLT_PLAY = {
  mm: 0.1,
  why: practice('0.1 mm on the diameter is left once the coat is at its thickest'),
} as const;

/** A rivet nut's hole may come out this much narrower, mm. */
export const RIVET_NUT_HOLE = {
  narrowerMm: 0.05,
  why: practice('a rivet nut’s hole keeps its size within 0.05 mm; its data sheet decides'),
} as const;

/** A tab that is pushed into a slot by hand, mm of play across; slots up to this much wider than the sheet are for tabs. */
export const TAB_PLAY = {
  mm: 0.1,
  slotUpToMm: 0.7,
  why: practice('a coated tab keeps 0.1 mm of play in its coated slot'),
} as const;

/** Surfaces of a 60° thread stand so that a coat takes four times its thickness off the pitch diameter. */
export const THREAD_COAT = {
  timesThickness: 4,
  /** Room that ISO leaves between a 6g bolt and a 6H thread: `baseMm` + `perPitch` x pitch. */
  baseMm: 0.015,
  perPitch: 0.011,
  why: {
    text: 'a coat counts four times on the pitch diameter of a 60° thread; a 6g bolt leaves 0.015 + 0.011 P',
    source: 'ISO 965-1, position g',
    confidence: 'published',
  },
} as const;

/** A coat is taken to be twice as thick where flanges face each other. */
export const INSIDE_U = { timesThickness: 2, fromDeg: 75 } as const;

/** What is closer to something else touches it sooner or later, mm. */
export const NEIGHBOUR_GAP = {
  mm: 1,
  why: practice('1 mm of air, or what the flange’s tip may be off, whichever is more; and the coat'),
} as const;

/** Air around a socket or ring spanner, mm, and how far a spanner has to swing. */
export const TOOL_ROOM = {
  aroundMm: 1,
  swingDeg: 60,
  why: {
    text: 'a socket keeps 1 mm of air all round; a spanner swings 60°',
    source: 'usual hand tools, from memory',
    confidence: 'memory',
  },
} as const;

export const MASK_WHY = practice('powder fills threads; set hardware afterwards, or mask it');
export const PLATED_HARDWARE_WHY = practice('baths attack hardware of another metal and creep under it');
export const FINISH_WHY = practice('zinc is plated on steel, aluminium is anodised');
export const UNLIKE_METALS_WHY = practice('aluminium is eaten where it touches steel in the wet');
export const BOLTS_WHY = practice(
  'the part formed 2000 times with usual spread on the brake (gauging 0.4 mm and 1° a bend), bolts let in where they fit best',
);
