import type { TableSource } from './figure';
import { findMetricFastener } from './hole-diameter';

/** How high the head of a hex bolt and its nut stand, mm. */
interface HexHeights {
  readonly thread: string;
  /** Bolt head, nominal. */
  readonly headMm: number;
  /** Nut, largest. */
  readonly nutMm: number;
}

export const HEX_HEIGHT_SOURCE: TableSource = { source: 'ISO 4017 heads and ISO 4032 nuts', confidence: 'published' };
/** The fits run through about ISO 2725-1 (sockets) and ISO 3318 (rings); written from memory. */
export const TOOL_SOURCE: TableSource = {
  source: 'fits through usual hand tools, about ISO 2725-1 and ISO 3318, from memory',
  confidence: 'memory',
};

const HEX_HEIGHTS: readonly HexHeights[] = [
  { thread: 'M2', headMm: 1.4, nutMm: 1.6 },
  { thread: 'M2.5', headMm: 1.7, nutMm: 2 },
  { thread: 'M3', headMm: 2, nutMm: 2.4 },
  { thread: 'M4', headMm: 2.8, nutMm: 3.2 },
  { thread: 'M5', headMm: 3.5, nutMm: 4.7 },
  { thread: 'M6', headMm: 4, nutMm: 5.2 },
  { thread: 'M8', headMm: 5.3, nutMm: 6.8 },
  { thread: 'M10', headMm: 6.4, nutMm: 8.4 },
  { thread: 'M12', headMm: 7.5, nutMm: 10.8 },
  { thread: 'M14', headMm: 8.8, nutMm: 12.8 },
  { thread: 'M16', headMm: 10, nutMm: 14.8 },
  { thread: 'M18', headMm: 11.5, nutMm: 15.8 },
  { thread: 'M20', headMm: 12.5, nutMm: 18 },
  { thread: 'M22', headMm: 14, nutMm: 19.4 },
  { thread: 'M24', headMm: 15, nutMm: 21.5 },
];

/** Room around a hex bolt on one face of the sheet. All mm. */
export interface HexEnvelope {
  readonly washerRadiusMm: number;
  readonly washerThicknessMm: number;
  /** To the corners of a sharp hex, the largest there can be. */
  readonly headRadiusMm: number;
  /** Head or nut, whichever is higher: either may sit on this face. */
  readonly headHeightMm: number;
  readonly socketRadiusMm: number;
  /** From the washer up: socket and ratchet. */
  readonly socketHeightMm: number;
  readonly ringRadiusMm: number;
  /** From the washer up: the ring on the head, lifted off it. */
  readonly ringHeightMm: number;
}

/** Sockets of the 3/8 drive are usual up to this width across flats, mm; then 1/2. */
const SMALL_DRIVE_UP_TO_MM = 19;
/** Socket and ratchet above the washer, mm, by drive. */
const SOCKET_HEIGHT_MM = { small: 55, large: 75 } as const;
/** A ring spanner lifted clear of the head needs twice its height and a little, mm. */
const RING_LIFT_MM = 2;

/**
 * Room that a hex bolt with a normal washer and its tools take up: washer ISO 7089, hex ISO 4017 and 4032, socket 1.25 s + 2.2 outside
 * (1/2 drive 1.25 s + 3.0), ring 1.5 s outside.
 * @returns null for threads without a washer or hex in the tables, inch threads among them
 */
export function findHexEnvelope(thread: string): HexEnvelope | null {
  const row = findMetricFastener(thread);
  const heights = HEX_HEIGHTS.find((one) => one.thread === thread);
  if (row?.washerMm == null || row.acrossFlatsMm === null || heights === undefined) return null;
  const flatsMm = row.acrossFlatsMm;
  const headHeightMm = Math.max(heights.headMm, heights.nutMm);
  const isSmall = flatsMm <= SMALL_DRIVE_UP_TO_MM;
  return {
    washerRadiusMm: row.washerMm.outside / 2,
    washerThicknessMm: row.washerMm.thickness,
    headRadiusMm: flatsMm / Math.sqrt(3),
    headHeightMm,
    socketRadiusMm: (1.25 * flatsMm + (isSmall ? 2.2 : 3)) / 2,
    socketHeightMm: isSmall ? SOCKET_HEIGHT_MM.small : SOCKET_HEIGHT_MM.large,
    ringRadiusMm: 0.75 * flatsMm,
    ringHeightMm: 2 * headHeightMm + RING_LIFT_MM,
  };
}
