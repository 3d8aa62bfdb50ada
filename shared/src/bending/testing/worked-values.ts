/**
 * Bends worked out beforehand, to check formulas against. Figures carry four decimals; lengths are in the unit of each row's
 * sheet (mm, or inch for gauge sheet): the formulas are homogeneous in length.
 */

function rowsOf(table: string): readonly (readonly string[])[] {
  return table
    .trim()
    .split('\n')
    .map((row) => row.split('|').map((cell) => cell.trim()));
}

function numberOf(cell: string | undefined): number {
  return cell === undefined || cell === '' ? Number.NaN : Number(cell);
}

/** One bend with its allowance, setbacks and deductions. `source` says where its K comes from; the rest is plane geometry. */
export interface WorkedBend {
  readonly id: string;
  readonly bendAngleDeg: number;
  readonly insideRadius: number;
  readonly thickness: number;
  readonly kFactor: number;
  readonly allowance: number;
  readonly setbackApex: number;
  readonly deductionApex: number;
  readonly setbackTangent: number;
  readonly deductionTangent: number;
  readonly insideSetbackApex: number;
  readonly source: string;
}

// id | angle | R | T | K | allowance | setback apex | deduction apex | setback tangent | deduction tangent | inside setback | source of K
export const WORKED_BENDS: readonly WorkedBend[] = rowsOf(`
dc01_1.2_R1.2_45 | 45 | 1.2 | 1.2 | 0.33 | 1.2535 | 0.9941 | 0.7347 | 0.9941 | 0.7347 | 0.4971 | Kalpakjian and Schmid (0.33 below R 2T)
crs18ga_R0.0625_45 | 45 | 0.0625 | 0.0478 | 0.44 | 0.0656 | 0.0457 | 0.0258 | 0.0457 | 0.0258 | 0.0259 | common practice, no source
al5052_2.03_R2.03_45 | 45 | 2.03 | 2.03 | 0.41 | 2.248 | 1.6817 | 1.1154 | 1.6817 | 1.1154 | 0.8409 | Machinery's Handbook, second group
al5052_3.18_R4.77_45 | 45 | 4.77 | 3.18 | 0.41 | 4.7704 | 3.293 | 1.8156 | 3.293 | 1.8156 | 1.9758 | Machinery's Handbook, second group
ss304_1.5_R1.5_45 | 45 | 1.5 | 1.5 | 0.45 | 1.7082 | 1.2426 | 0.777 | 1.2426 | 0.777 | 0.6213 | common practice, no source
dc01_1.2_R1.2_90 | 90 | 1.2 | 1.2 | 0.33 | 2.507 | 2.4 | 2.293 | 2.4 | 2.293 | 1.2 | Kalpakjian and Schmid (0.33 below R 2T)
crs18ga_R0.0625_90 | 90 | 0.0625 | 0.0478 | 0.44 | 0.1312 | 0.1103 | 0.0894 | 0.1103 | 0.0894 | 0.0625 | common practice, no source
al5052_2.03_R2.03_90 | 90 | 2.03 | 2.03 | 0.41 | 4.4961 | 4.06 | 3.6239 | 4.06 | 3.6239 | 2.03 | Machinery's Handbook, second group
al5052_3.18_R4.77_90 | 90 | 4.77 | 3.18 | 0.41 | 9.5407 | 7.95 | 6.3593 | 7.95 | 6.3593 | 4.77 | Machinery's Handbook, second group
ss304_1.5_R1.5_90 | 90 | 1.5 | 1.5 | 0.45 | 3.4165 | 3.0 | 2.5835 | 3.0 | 2.5835 | 1.5 | common practice, no source
dc01_1.2_R1.2_120 | 120 | 1.2 | 1.2 | 0.33 | 3.3427 | 4.1569 | 4.9712 | 2.4 | 1.4573 | 2.0785 | Kalpakjian and Schmid (0.33 below R 2T)
crs18ga_R0.0625_120 | 120 | 0.0625 | 0.0478 | 0.44 | 0.1749 | 0.191 | 0.2071 | 0.1103 | 0.0457 | 0.1083 | common practice, no source
al5052_2.03_R2.03_120 | 120 | 2.03 | 2.03 | 0.41 | 5.9948 | 7.0321 | 8.0695 | 4.06 | 2.1252 | 3.5161 | Machinery's Handbook, second group
al5052_3.18_R4.77_120 | 120 | 4.77 | 3.18 | 0.41 | 12.7209 | 13.7698 | 14.8187 | 7.95 | 3.1791 | 8.2619 | Machinery's Handbook, second group
ss304_1.5_R1.5_120 | 120 | 1.5 | 1.5 | 0.45 | 4.5553 | 5.1962 | 5.837 | 3.0 | 1.4447 | 2.5981 | common practice, no source
dc01_1.2_R1.2_135 | 135 | 1.2 | 1.2 | 0.33 | 3.7605 | 5.7941 | 7.8277 | 2.4 | 1.0395 | 2.8971 | Kalpakjian and Schmid (0.33 below R 2T)
crs18ga_R0.0625_135 | 135 | 0.0625 | 0.0478 | 0.44 | 0.1968 | 0.2663 | 0.3358 | 0.1103 | 0.0238 | 0.1509 | common practice, no source
al5052_2.03_R2.03_135 | 135 | 2.03 | 2.03 | 0.41 | 6.7441 | 9.8017 | 12.8593 | 4.06 | 1.3759 | 4.9009 | Machinery's Handbook, second group
al5052_3.18_R4.77_135 | 135 | 4.77 | 3.18 | 0.41 | 14.3111 | 19.193 | 24.0749 | 7.95 | 1.5889 | 11.5158 | Machinery's Handbook, second group
ss304_1.5_R1.5_135 | 135 | 1.5 | 1.5 | 0.45 | 5.1247 | 7.2426 | 9.3606 | 3.0 | 0.8753 | 3.6213 | common practice, no source
groover_ex | 60 | 4.75 | 3.2 | 0.33 | 6.08 | 4.5899 | 3.0998 | 4.5899 | 3.0998 | 2.7424 | Groover, bending example
limit_K0.5_R10 | 90 | 10.0 | 1.0 | 0.5 | 16.4934 | 11.0 | 5.5066 | 11.0 | 5.5066 | 10.0 | limit of elastic bending
`).map((cells) => ({
  id: cells[0] ?? '',
  bendAngleDeg: numberOf(cells[1]),
  insideRadius: numberOf(cells[2]),
  thickness: numberOf(cells[3]),
  kFactor: numberOf(cells[4]),
  allowance: numberOf(cells[5]),
  setbackApex: numberOf(cells[6]),
  deductionApex: numberOf(cells[7]),
  setbackTangent: numberOf(cells[8]),
  deductionTangent: numberOf(cells[9]),
  insideSetbackApex: numberOf(cells[10]),
  source: cells[11] ?? '',
}));

/** Straight length of a 90 degree bend after the handbook, c * T + 1.57 * R. Source: Machinery's Handbook, lengths of straight stock. */
export interface HandbookBend {
  readonly id: string;
  readonly coefficient: number;
  readonly insideRadius: number;
  readonly thickness: number;
  readonly bendAngleDeg: number;
  readonly straightLength: number;
  /** K that the coefficient stands for; NaN where not worked out. */
  readonly impliedK: number;
}

// id | c | R | T | angle | straight length | implied K
export const HANDBOOK_BENDS: readonly HandbookBend[] = rowsOf(`
mh_g1_brass_soft | 0.55 | 1.0 | 1.0 | 90 | 2.12 | 0.3501
mh_g1_cu_2mm | 0.55 | 3.0 | 2.0 | 90 | 5.81 | 0.3501
mh_g2_5052_2.03 | 0.64 | 2.03 | 2.03 | 90 | 4.4863 | 0.4074
mh_g2_5052_3.18 | 0.64 | 4.77 | 3.18 | 90 | 9.5241 | 0.4074
mh_g3_crs_18ga | 0.71 | 0.0625 | 0.0478 | 90 | 0.1321 | 0.452
mh_g3_crs_1.2 | 0.71 | 1.2 | 1.2 | 90 | 2.736 | 0.452
mh_g3_crs_18ga_45 | 0.71 | 0.0625 | 0.0478 | 45 | 0.066 | 
`).map((cells) => ({
  id: cells[0] ?? '',
  coefficient: numberOf(cells[1]),
  insideRadius: numberOf(cells[2]),
  thickness: numberOf(cells[3]),
  bendAngleDeg: numberOf(cells[4]),
  straightLength: numberOf(cells[5]),
  impliedK: numberOf(cells[6]),
}));

/** Bends after DIN 6935; angles as the standard counts them. Source: DIN 6935, as reproduced in Tabellenbuch Metall. */
export interface DinBend {
  readonly id: string;
  readonly openingAngleDeg: number;
  readonly insideRadiusMm: number;
  readonly thicknessMm: number;
  readonly correction: number;
  readonly lengthChangeMm: number;
  /** NaN where no legs were given. */
  readonly legAMm: number;
  readonly legBMm: number;
  readonly flatMm: number;
}

// id | opening angle | r | s | k | v | leg a | leg b | flat
export const DIN_BENDS: readonly DinBend[] = rowsOf(`
din_book_60 | 60 | 6 | 5 | 0.6896 | -5.8229 | 16 | 21 | 31.1771
din_dc01_1.2_b135 | 135 | 1.2 | 1.2 | 0.65 | -0.7394 | 50 | 30 | 79.2606
din_dc01_1.2_b90 | 90 | 1.2 | 1.2 | 0.65 | -2.3024 | 50 | 30 | 77.6976
din_dc01_1.2_b60 | 60 | 1.2 | 1.2 | 0.65 | -1.4699 | 50 | 30 | 78.5301
din_dc01_1.2_b45 | 45 | 1.2 | 1.2 | 0.65 | -1.0537 | 50 | 30 | 78.9463
din_304_1.5_b135 | 135 | 1.5 | 1.5 | 0.65 | -0.9243 | 40 | 25 | 64.0757
din_304_1.5_b90 | 90 | 1.5 | 1.5 | 0.65 | -2.878 | 40 | 25 | 62.122
din_304_1.5_b60 | 60 | 1.5 | 1.5 | 0.65 | -1.8374 | 40 | 25 | 63.1626
din_304_1.5_b45 | 45 | 1.5 | 1.5 | 0.65 | -1.3171 | 40 | 25 | 63.6829
din_r1_s1_90 | 90 | 1 | 1 | 0.65 | -1.9187 |  |  | 
din_r1_s0.4_90 | 90 | 1 | 0.4 | 0.849 | -0.9625 |  |  | 
din_r2.5_s2_90 | 90 | 2.5 | 2 | 0.6985 | -3.9759 |  |  | 
din_large_r | 90 | 20 | 2 | 1.0 | -11.0133 |  |  | 
din_r_over_s_5 | 90 | 10 | 2 | 0.9995 | -6.722 |  |  | 
din_small_r | 90 | 0.5 | 2 | 0.349 | -3.6664 |  |  | 
din_beta_120 | 120 | 2 | 2 | 0.65 | -1.8437 | 40 | 40 | 78.1563
din_beta_165 | 165 | 2 | 2 | 0.65 | -0.3595 | 40 | 40 | 79.6405
din_beta_170 | 170 | 2 | 2 | 0.65 | 0.0 | 40 | 40 | 80.0
`).map((cells) => ({
  id: cells[0] ?? '',
  openingAngleDeg: numberOf(cells[1]),
  insideRadiusMm: numberOf(cells[2]),
  thicknessMm: numberOf(cells[3]),
  correction: numberOf(cells[4]),
  lengthChangeMm: numberOf(cells[5]),
  legAMm: numberOf(cells[6]),
  legBMm: numberOf(cells[7]),
  flatMm: numberOf(cells[8]),
}));

/** k of DIN 6935 by R/T, four decimals. Source: DIN 6935, as reproduced in Tabellenbuch Metall. */
export const DIN_CORRECTIONS: readonly { readonly ratio: number; readonly correction: number }[] = rowsOf(`
0.1 | 0.15
0.25 | 0.349
0.5 | 0.4995
0.65 | 0.5565
0.75 | 0.5875
1 | 0.65
1.2 | 0.6896
1.5 | 0.738
2 | 0.8005
2.5 | 0.849
3 | 0.8886
4 | 0.951
5 | 0.9995
6 | 1.0
10 | 1.0
`).map((cells) => ({ ratio: numberOf(cells[0]), correction: numberOf(cells[1]) }));

/** Flat lengths of whole strips, mm, all bends alike. Source: plane geometry with the K named. */
export interface WorkedStrip {
  readonly id: string;
  readonly reference: 'outsideApex' | 'insideApex' | 'outsideTangent';
  readonly legsMm: readonly number[];
  readonly thicknessMm: number;
  readonly bendAngleDeg: number;
  readonly insideRadiusMm: number;
  readonly kFactor: number;
  readonly flatMm: number;
}

const REFERENCES = { apex: 'outsideApex', 'inside-apex': 'insideApex', tangent: 'outsideTangent' } as const;

function referenceOf(cell: string | undefined): WorkedStrip['reference'] {
  if (cell === 'apex' || cell === 'inside-apex' || cell === 'tangent') return REFERENCES[cell];
  throw new RangeError(`No reference is called ${String(cell)}`);
}

// id | reference | legs | T | angle | R | K | flat
export const WORKED_STRIPS: readonly WorkedStrip[] = rowsOf(`
L_outside | apex | 50 30 | 1.2 | 90 | 1.2 | 0.33 | 77.707
L_inside | inside-apex | 48.8 28.8 | 1.2 | 90 | 1.2 | 0.33 | 77.707
U_outside | apex | 30 60 30 | 2.03 | 90 | 2.03 | 0.41 | 112.7522
Z_outside | apex | 25 40 25 | 1.5 | 90 | 1.5 | 0.45 | 84.833
hat_outside | apex | 20 25 50 25 20 | 1.5 | 90 | 1.5 | 0.45 | 129.6659
acute_apex | apex | 50 40 | 1.5 | 135 | 1.5 | 0.45 | 80.6394
acute_tangent | tangent | 45.7574 35.7574 | 1.5 | 135 | 1.5 | 0.45 | 80.6395
hem_180_tangent | tangent | 60 12 | 1.0 | 180 | 0.5 | 0.35 | 71.6704
big_R_180_tangent | tangent | 40 40 | 1.0 | 180 | 5 | 0.5 | 85.2788
`).map((cells) => ({
  id: cells[0] ?? '',
  reference: referenceOf(cells[1]),
  legsMm: (cells[2] ?? '').split(' ').map(Number),
  thicknessMm: numberOf(cells[3]),
  bendAngleDeg: numberOf(cells[4]),
  insideRadiusMm: numberOf(cells[5]),
  kFactor: numberOf(cells[6]),
  flatMm: numberOf(cells[7]),
}));
