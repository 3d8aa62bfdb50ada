import type { TableSource } from './figure';

/** One metric thread: every size a hole in sheet can follow from. Null where the standard has no such row. All mm. */
export interface MetricFastener {
  readonly thread: string;
  readonly nominalMm: number;
  readonly pitchMm: number;
  readonly clearanceMm: { readonly close: number; readonly medium: number; readonly coarse: number };
  readonly tapDrillMm: number;
  /** Round-body blind rivet nut. */
  readonly rivetNutMm: number | null;
  /** Smallest and largest cone of a 90° countersink, and how deep the smallest one reaches. */
  readonly countersinkMm: { readonly smallest: number; readonly largest: number; readonly depth: number } | null;
  /** Normal series washer. */
  readonly washerMm: { readonly inside: number; readonly outside: number; readonly thickness: number } | null;
  readonly largeWasherOutsideMm: number | null;
  readonly acrossFlatsMm: number | null;
}

export const CLEARANCE_SOURCE: TableSource = {
  source: 'ISO 273:1979 (close, medium, coarse)',
  confidence: 'published',
};
export const TAP_DRILL_SOURCE: TableSource = { source: 'ISO 261 pitches, ISO 2306 drills', confidence: 'published' };
/** The smallest cone is the head of ISO 7721; the largest is written from memory. */
export const COUNTERSINK_SOURCE: TableSource = { source: 'ISO 15065 with heads of ISO 7721', confidence: 'memory' };
export const RIVET_NUT_SOURCE: TableSource = {
  source: "usual round-body sizes; the chosen nut's data sheet decides",
  confidence: 'common-practice',
};
export const WASHER_SOURCE: TableSource = { source: 'ISO 7089 and ISO 7093-1', confidence: 'published' };
/** Older DIN 931/934 hexes differ: M10 17, M12 19, M14 22, M22 32. */
export const HEX_SOURCE: TableSource = { source: 'ISO 4017 and ISO 4032', confidence: 'published' };
export const INCH_CLEARANCE_SOURCE: TableSource = { source: 'ASME B18.2.8, Table 1', confidence: 'published' };
export const INCH_TAP_SOURCE: TableSource = {
  source: "ASME B1.1 threads, drills as tabled in Machinery's Handbook",
  confidence: 'published',
};

/** ISO metric coarse threads M2 to M24. */
export const METRIC_FASTENERS: readonly MetricFastener[] = [
  {
    thread: 'M2',
    nominalMm: 2,
    pitchMm: 0.4,
    clearanceMm: { close: 2.2, medium: 2.4, coarse: 2.6 },
    tapDrillMm: 1.6,
    rivetNutMm: null,
    countersinkMm: { smallest: 4.4, largest: 4.5, depth: 1.0 },
    washerMm: { inside: 2.2, outside: 5, thickness: 0.3 },
    largeWasherOutsideMm: null,
    acrossFlatsMm: 4,
  },
  {
    thread: 'M2.5',
    nominalMm: 2.5,
    pitchMm: 0.45,
    clearanceMm: { close: 2.7, medium: 2.9, coarse: 3.1 },
    tapDrillMm: 2.05,
    rivetNutMm: null,
    countersinkMm: { smallest: 5.5, largest: 5.6, depth: 1.3 },
    washerMm: { inside: 2.7, outside: 6, thickness: 0.5 },
    largeWasherOutsideMm: null,
    acrossFlatsMm: 5,
  },
  {
    thread: 'M3',
    nominalMm: 3,
    pitchMm: 0.5,
    clearanceMm: { close: 3.2, medium: 3.4, coarse: 3.6 },
    tapDrillMm: 2.5,
    rivetNutMm: 5.0,
    countersinkMm: { smallest: 6.3, largest: 6.5, depth: 1.45 },
    washerMm: { inside: 3.2, outside: 7, thickness: 0.5 },
    largeWasherOutsideMm: 9,
    acrossFlatsMm: 5.5,
  },
  {
    thread: 'M3.5',
    nominalMm: 3.5,
    pitchMm: 0.6,
    clearanceMm: { close: 3.7, medium: 3.9, coarse: 4.2 },
    tapDrillMm: 2.9,
    rivetNutMm: null,
    countersinkMm: { smallest: 8.2, largest: 8.4, depth: 2.15 },
    washerMm: null,
    largeWasherOutsideMm: null,
    acrossFlatsMm: null,
  },
  {
    thread: 'M4',
    nominalMm: 4,
    pitchMm: 0.7,
    clearanceMm: { close: 4.3, medium: 4.5, coarse: 4.8 },
    tapDrillMm: 3.3,
    rivetNutMm: 6.0,
    countersinkMm: { smallest: 9.4, largest: 9.6, depth: 2.45 },
    washerMm: { inside: 4.3, outside: 9, thickness: 0.8 },
    largeWasherOutsideMm: 12,
    acrossFlatsMm: 7,
  },
  {
    thread: 'M5',
    nominalMm: 5,
    pitchMm: 0.8,
    clearanceMm: { close: 5.3, medium: 5.5, coarse: 5.8 },
    tapDrillMm: 4.2,
    rivetNutMm: 7.0,
    countersinkMm: { smallest: 10.4, largest: 10.65, depth: 2.45 },
    washerMm: { inside: 5.3, outside: 10, thickness: 1 },
    largeWasherOutsideMm: 15,
    acrossFlatsMm: 8,
  },
  {
    thread: 'M6',
    nominalMm: 6,
    pitchMm: 1,
    clearanceMm: { close: 6.4, medium: 6.6, coarse: 7 },
    tapDrillMm: 5.0,
    rivetNutMm: 9.0,
    countersinkMm: { smallest: 12.6, largest: 12.85, depth: 3.0 },
    washerMm: { inside: 6.4, outside: 12, thickness: 1.6 },
    largeWasherOutsideMm: 18,
    acrossFlatsMm: 10,
  },
  {
    thread: 'M7',
    nominalMm: 7,
    pitchMm: 1,
    clearanceMm: { close: 7.4, medium: 7.6, coarse: 8 },
    tapDrillMm: 6.0,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: null,
    largeWasherOutsideMm: null,
    acrossFlatsMm: null,
  },
  {
    thread: 'M8',
    nominalMm: 8,
    pitchMm: 1.25,
    clearanceMm: { close: 8.4, medium: 9, coarse: 10 },
    tapDrillMm: 6.8,
    rivetNutMm: 11.0,
    countersinkMm: { smallest: 17.3, largest: 17.55, depth: 4.15 },
    washerMm: { inside: 8.4, outside: 16, thickness: 1.6 },
    largeWasherOutsideMm: 24,
    acrossFlatsMm: 13,
  },
  {
    thread: 'M10',
    nominalMm: 10,
    pitchMm: 1.5,
    clearanceMm: { close: 10.5, medium: 11, coarse: 12 },
    tapDrillMm: 8.5,
    rivetNutMm: 13.0,
    countersinkMm: { smallest: 20.0, largest: 20.3, depth: 4.5 },
    washerMm: { inside: 10.5, outside: 20, thickness: 2 },
    largeWasherOutsideMm: 30,
    acrossFlatsMm: 16,
  },
  {
    thread: 'M12',
    nominalMm: 12,
    pitchMm: 1.75,
    clearanceMm: { close: 13, medium: 13.5, coarse: 14.5 },
    tapDrillMm: 10.2,
    rivetNutMm: 16.0,
    countersinkMm: null,
    washerMm: { inside: 13, outside: 24, thickness: 2.5 },
    largeWasherOutsideMm: 37,
    acrossFlatsMm: 18,
  },
  {
    thread: 'M14',
    nominalMm: 14,
    pitchMm: 2,
    clearanceMm: { close: 15, medium: 15.5, coarse: 16.5 },
    tapDrillMm: 12.0,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: { inside: 15, outside: 28, thickness: 2.5 },
    largeWasherOutsideMm: null,
    acrossFlatsMm: 21,
  },
  {
    thread: 'M16',
    nominalMm: 16,
    pitchMm: 2,
    clearanceMm: { close: 17, medium: 17.5, coarse: 18.5 },
    tapDrillMm: 14.0,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: { inside: 17, outside: 30, thickness: 3 },
    largeWasherOutsideMm: 50,
    acrossFlatsMm: 24,
  },
  {
    thread: 'M18',
    nominalMm: 18,
    pitchMm: 2.5,
    clearanceMm: { close: 19, medium: 20, coarse: 21 },
    tapDrillMm: 15.5,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: { inside: 19, outside: 34, thickness: 3 },
    largeWasherOutsideMm: null,
    acrossFlatsMm: 27,
  },
  {
    thread: 'M20',
    nominalMm: 20,
    pitchMm: 2.5,
    clearanceMm: { close: 21, medium: 22, coarse: 24 },
    tapDrillMm: 17.5,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: { inside: 21, outside: 37, thickness: 3 },
    largeWasherOutsideMm: 60,
    acrossFlatsMm: 30,
  },
  {
    thread: 'M22',
    nominalMm: 22,
    pitchMm: 2.5,
    clearanceMm: { close: 23, medium: 24, coarse: 26 },
    tapDrillMm: 19.5,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: { inside: 23, outside: 39, thickness: 3 },
    largeWasherOutsideMm: null,
    acrossFlatsMm: 34,
  },
  {
    thread: 'M24',
    nominalMm: 24,
    pitchMm: 3,
    clearanceMm: { close: 25, medium: 26, coarse: 28 },
    tapDrillMm: 21.0,
    rivetNutMm: null,
    countersinkMm: null,
    washerMm: { inside: 25, outside: 44, thickness: 4 },
    largeWasherOutsideMm: 72,
    acrossFlatsMm: 36,
  },
];
