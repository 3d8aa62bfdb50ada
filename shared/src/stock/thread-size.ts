import { MM_PER_INCH } from '../units/length';
import { METRIC_FASTENERS } from './fastener-tables';
import type { TableSource } from './figure';
import { findHoleDiameterMm, findMetricFastener, threadsFor } from './hole-diameter';

export const METRIC_SIZE_SOURCE: TableSource = { source: 'ISO 261, coarse series', confidence: 'published' };
export const INCH_SIZE_SOURCE: TableSource = { source: 'ASME B1.1', confidence: 'published' };

/** Largest diameter of a thread, mm: "M6", "1/4", "1/4-20", "#10-24"; numbered sizes are 0.060 + 0.013 n inches. Null when unreadable. */
export function threadDiameterMm(thread: string): number | null {
  const metric = findMetricFastener(thread);
  if (metric !== null) return metric.nominalMm;
  const numbered = /^#(\d+)/.exec(thread);
  if (numbered?.[1] !== undefined) return (0.06 + 0.013 * Number(numbered[1])) * MM_PER_INCH;
  const fraction = /^(\d+)\/(\d+)/.exec(thread);
  if (fraction?.[1] === undefined || fraction[2] === undefined) return null;
  return (Number(fraction[1]) / Number(fraction[2])) * MM_PER_INCH;
}

/** Distance of two turns, mm; null for a thread whose name doesn't say it. */
export function threadPitchMm(thread: string): number | null {
  const metric = findMetricFastener(thread);
  if (metric !== null) return metric.pitchMm;
  const turns = /-(\d+)$/.exec(thread);
  return turns?.[1] === undefined ? null : MM_PER_INCH / Number(turns[1]);
}

/** Widths nearer than this are the same, mm. */
const SAME_WIDTH_MM = 0.005;
const FITS = ['close', 'medium', 'coarse'] as const;

/**
 * Thread that an opening of a width was most likely made for: one that has exactly this clearance, else a metric one whose close fit
 * is narrower and whose coarse fit is wider. Null when there is none.
 */
export function threadThrough(widthMm: number): string | null {
  const exact = threadsFor('clearance').find((thread) =>
    FITS.some((fit) => {
      const clearanceMm = findHoleDiameterMm({ kind: 'clearance', thread, fit });
      return clearanceMm !== null && Math.abs(clearanceMm - widthMm) < SAME_WIDTH_MM;
    }),
  );
  if (exact !== undefined) return exact;
  const within = METRIC_FASTENERS.find(
    ({ clearanceMm }) => widthMm > clearanceMm.close && widthMm < clearanceMm.coarse,
  );
  return within?.thread ?? null;
}
