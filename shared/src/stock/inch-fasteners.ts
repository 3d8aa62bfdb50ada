/** Clearance holes for one inch size, inches: close, normal, loose. */
export interface InchClearance {
  readonly size: string;
  readonly closeIn: number;
  readonly normalIn: number;
  readonly looseIn: number;
}

/** Tap drill of one unified thread, inches. */
export interface InchTap {
  readonly thread: string;
  readonly size: string;
  readonly drillIn: number;
}

/** Source: ASME B18.2.8, Table 1. */
export const INCH_CLEARANCES: readonly InchClearance[] = [
  { size: '#4', closeIn: 0.12, normalIn: 0.1285, looseIn: 0.144 },
  { size: '#5', closeIn: 0.1406, normalIn: 0.1562, looseIn: 0.1719 },
  { size: '#6', closeIn: 0.154, normalIn: 0.1695, looseIn: 0.185 },
  { size: '#8', closeIn: 0.18, normalIn: 0.196, looseIn: 0.213 },
  { size: '#10', closeIn: 0.2055, normalIn: 0.221, looseIn: 0.238 },
  { size: '1/4', closeIn: 0.2656, normalIn: 0.2812, looseIn: 0.2969 },
  { size: '5/16', closeIn: 0.3281, normalIn: 0.3438, looseIn: 0.3594 },
  { size: '3/8', closeIn: 0.3906, normalIn: 0.4062, looseIn: 0.4219 },
  { size: '7/16', closeIn: 0.4531, normalIn: 0.4688, looseIn: 0.4844 },
  { size: '1/2', closeIn: 0.5312, normalIn: 0.5625, looseIn: 0.6094 },
];

/** Source: ASME B1.1 threads; customary drills as tabled in Machinery's Handbook. */
export const INCH_TAPS: readonly InchTap[] = [
  { thread: '#4-40', size: '#4', drillIn: 0.089 },
  { thread: '#4-48', size: '#4', drillIn: 0.0935 },
  { thread: '#5-40', size: '#5', drillIn: 0.1015 },
  { thread: '#6-32', size: '#6', drillIn: 0.1065 },
  { thread: '#6-40', size: '#6', drillIn: 0.113 },
  { thread: '#8-32', size: '#8', drillIn: 0.136 },
  { thread: '#8-36', size: '#8', drillIn: 0.136 },
  { thread: '#10-24', size: '#10', drillIn: 0.1495 },
  { thread: '#10-32', size: '#10', drillIn: 0.159 },
  { thread: '#12-24', size: '#12', drillIn: 0.177 },
  { thread: '#12-28', size: '#12', drillIn: 0.182 },
  { thread: '1/4-20', size: '1/4', drillIn: 0.201 },
  { thread: '1/4-28', size: '1/4', drillIn: 0.213 },
  { thread: '5/16-18', size: '5/16', drillIn: 0.257 },
  { thread: '5/16-24', size: '5/16', drillIn: 0.272 },
  { thread: '3/8-16', size: '3/8', drillIn: 0.3125 },
  { thread: '3/8-24', size: '3/8', drillIn: 0.332 },
  { thread: '7/16-14', size: '7/16', drillIn: 0.368 },
  { thread: '7/16-20', size: '7/16', drillIn: 0.3906 },
  { thread: '1/2-13', size: '1/2', drillIn: 0.4219 },
  { thread: '1/2-20', size: '1/2', drillIn: 0.4531 },
  { thread: '9/16-12', size: '9/16', drillIn: 0.4844 },
  { thread: '9/16-18', size: '9/16', drillIn: 0.5156 },
  { thread: '5/8-11', size: '5/8', drillIn: 0.5312 },
  { thread: '5/8-18', size: '5/8', drillIn: 0.5781 },
  { thread: '3/4-10', size: '3/4', drillIn: 0.6562 },
  { thread: '3/4-16', size: '3/4', drillIn: 0.6875 },
];
