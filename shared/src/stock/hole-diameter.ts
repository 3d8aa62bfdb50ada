import { METRIC_FASTENERS, type MetricFastener } from './fastener-tables';
import { INCH_CLEARANCES, INCH_TAPS } from './inch-fasteners';
import { MM_PER_INCH } from '../units/length';

/** What a hole is for, as far as its size depends on it. Every `HolePurpose` of a layout is one. */
export type HoleUse =
  | { readonly kind: 'clearance'; readonly thread: string; readonly fit: 'close' | 'medium' | 'coarse' }
  | { readonly kind: 'tapped' | 'rivet-nut' | 'countersunk'; readonly thread: string }
  | { readonly kind: 'pass-through' | 'plain' | 'lightening'; readonly diameterMm: number };

const METRIC: ReadonlyMap<string, MetricFastener> = new Map(METRIC_FASTENERS.map((row) => [row.thread, row]));
const INCH_TAP_SIZE: ReadonlyMap<string, string> = new Map(INCH_TAPS.map((row) => [row.thread, row.size]));

/** The metric row of a thread ("M6"), or null. */
export function findMetricFastener(thread: string): MetricFastener | null {
  return METRIC.get(thread) ?? null;
}

/**
 * Diameter to cut for a purpose, mm: ISO 273 for clearance, ISO 2306 drill for tapped, the rivet nut's hole, the
 * through hole (ISO 273 medium) under a countersink; the stated diameter otherwise. Inch threads ("1/4", "1/4-20",
 * "#10-24") follow ASME B18.2.8 (close, normal, loose) and the customary tap drills.
 * @returns the diameter, or null when the tables have no such thread for this purpose
 */
export function findHoleDiameterMm(use: HoleUse): number | null {
  switch (use.kind) {
    case 'pass-through':
    case 'plain':
    case 'lightening':
      return use.diameterMm;
    case 'clearance':
      return METRIC.get(use.thread)?.clearanceMm[use.fit] ?? inchClearanceMm(use.thread, use.fit);
    case 'tapped':
      return METRIC.get(use.thread)?.tapDrillMm ?? inchTapMm(use.thread);
    case 'rivet-nut':
      return METRIC.get(use.thread)?.rivetNutMm ?? null;
    case 'countersunk': {
      const row = METRIC.get(use.thread);
      return row?.countersinkMm == null ? null : row.clearanceMm.medium;
    }
  }
}

/**
 * Diameter to cut for a purpose, mm. Documents that passed the invariants only hold threads the tables know.
 * @throws RangeError when the tables have no such thread for this purpose
 */
export function holeDiameterMm(use: HoleUse): number {
  const diameterMm = findHoleDiameterMm(use);
  if (diameterMm === null)
    throw new RangeError(`no ${use.kind} hole is tabled for ${'thread' in use ? use.thread : ''}`);
  return diameterMm;
}

/** Threads the tables offer for a kind of hole, smallest first; metric before inch. */
export function threadsFor(kind: 'clearance' | 'tapped' | 'rivet-nut' | 'countersunk'): readonly string[] {
  const metric = METRIC_FASTENERS.filter((row) =>
    kind === 'rivet-nut' ? row.rivetNutMm !== null : kind === 'countersunk' ? row.countersinkMm !== null : true,
  ).map((row) => row.thread);
  if (kind === 'clearance') return [...metric, ...INCH_CLEARANCES.map((row) => row.size)];
  if (kind === 'tapped') return [...metric, ...INCH_TAPS.map((row) => row.thread)];
  return metric;
}

function inchClearanceMm(thread: string, fit: 'close' | 'medium' | 'coarse'): number | null {
  const size = INCH_TAP_SIZE.get(thread) ?? thread;
  const row = INCH_CLEARANCES.find((candidate) => candidate.size === size);
  if (row === undefined) return null;
  return (fit === 'close' ? row.closeIn : fit === 'medium' ? row.normalIn : row.looseIn) * MM_PER_INCH;
}

function inchTapMm(thread: string): number | null {
  const row = INCH_TAPS.find((candidate) => candidate.thread === thread);
  return row === undefined ? null : row.drillIn * MM_PER_INCH;
}
