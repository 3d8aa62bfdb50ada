import { commonPractice, fromMemory, published } from './figure';
import type { HandbookK, KBands, MinimumRadius, SheetMaterial } from './material';
import { MM_PER_INCH } from '../units/length';

const ANY_THICKNESS = Number.POSITIVE_INFINITY;
const ALUMINIUM_ASSOCIATION = 'Aluminum Association, Aluminum Design Manual 2005, Part VII Table 3-1 (90° cold bends)';
const HANDBOOK = "Machinery's Handbook, lengths of straight stock for 90° bends";
const ADM_ROW_INCHES = [0.0156, 0.0312, 0.0625, 0.125, 0.1875, 0.25, 0.375, 0.5] as const;

/** Rows of the aluminium table: multiples of T for the eight thicknesses of `ADM_ROW_INCHES`. */
function aluminiumRadius(multiples: readonly number[], refuseBelow: boolean): MinimumRadius {
  return {
    rows: multiples.map((recommendedOverT, row) => ({
      upToThicknessMm: (ADM_ROW_INCHES[row] ?? ANY_THICKNESS) * MM_PER_INCH,
      recommendedOverT,
    })),
    absoluteOverT: null,
    refuseBelow,
    source: ALUMINIUM_ASSOCIATION,
    confidence: 'published',
  };
}

function radiusOverT(recommendedOverT: number, absoluteOverT: number | null, source: string): MinimumRadius {
  return {
    rows: [{ upToThicknessMm: ANY_THICKNESS, recommendedOverT }],
    absoluteOverT,
    refuseBelow: false,
    source,
    confidence: 'common-practice',
  };
}

function airBendBands(
  belowOne: readonly [number, number],
  oneToThree: readonly [number, number],
  aboveThree: readonly [number, number],
): KBands {
  const band = ([low, high]: readonly [number, number]) => ({ low, high });
  return {
    belowOne: band(belowOne),
    oneToThree: band(oneToThree),
    aboveThree: band(aboveThree),
    source: 'bands the trade uses for air bends, no source',
    confidence: 'common-practice',
  };
}

/** K that a straight length of c·T + 1.57·R implies: c / (π/2). */
function handbookK(coefficient: number, group: string): HandbookK {
  return { kFactor: coefficient / (Math.PI / 2), source: `${HANDBOOK}, ${group}`, confidence: 'published' };
}

const HALF_HARD_GROUP = handbookK(0.64, 'soft steel, aluminium, half-hard copper and brass (0.64 T)');
const HARD_GROUP = handbookK(0.71, 'cold rolled and spring steel, hard copper, bronze (0.71 T)');

const STEEL_BANDS = airBendBands([0.33, 0.42], [0.38, 0.46], [0.44, 0.5]);
const STAINLESS_BANDS = airBendBands([0.36, 0.44], [0.41, 0.48], [0.45, 0.5]);
const ALLOY_BANDS = airBendBands([0.3, 0.4], [0.35, 0.45], [0.42, 0.5]);
const SOFT_BANDS = airBendBands([0.3, 0.38], [0.33, 0.42], [0.4, 0.5]);

const EN_1993 = 'EN 1993-1-1, 3.2.6';
const B209 = 'ASTM B209';
const AA = 'Aluminum Association, Standards and Data';
const V_SHARE = 'radius as a share of the V opening, trade press';
/** Share of V for metals the trade's percentages do not list: low-carbon steel's 16 % scaled by strength over 410 MPa. */
function scaledShare(ultimateMpa: number) {
  return fromMemory((0.16 * ultimateMpa) / 410, `${V_SHARE}: 16 % of V scaled by tensile strength over 410 MPa`);
}

/** Twelve materials that small shops bend. Every figure with its source; a workshop may overrule each one. */
export const SHEET_MATERIALS: readonly SheetMaterial[] = [
  {
    id: 'dc01',
    name: 'Mild steel, cold rolled DC01 / A1008 CS',
    shortName: 'Mild steel',
    family: 'steel',
    gaugeFamily: 'steel',
    densityKgPerM3: published(7850, EN_1993),
    elasticModulusGpa: commonPractice(205, 'handbook range 200 to 210; EN 1993-1-1 takes 210'),
    yieldMpa: published(140, 'EN 10130 DC01: at most 280, design assumes no less than 140'),
    ultimateMpa: published(410, 'EN 10130 DC01: 270 to 410'),
    minimumRadius: radiusOverT(1, 0.5, 'shop rule; Kalpakjian & Schmid give 0.5 T soft to 4 T hard'),
    kBands: STEEL_BANDS,
    handbookK: HARD_GROUP,
    deliveredRadiusShare: commonPractice(0.16, `${V_SHARE}: 15 to 17 %`),
    kFrom: 'din6935',
    note: '',
  },
  {
    id: 'hrpo',
    name: 'Hot rolled, pickled and oiled DD11 / A1011 CS',
    shortName: 'Pickled steel',
    family: 'steel',
    gaugeFamily: 'steel',
    densityKgPerM3: published(7850, EN_1993),
    elasticModulusGpa: commonPractice(205, 'handbook range 200 to 210'),
    yieldMpa: fromMemory(170, 'EN 10111 DD11: 170 to 360'),
    ultimateMpa: published(440, 'EN 10111 DD11: at most 440'),
    minimumRadius: {
      rows: [
        { upToThicknessMm: 6, recommendedOverT: 1 },
        { upToThicknessMm: ANY_THICKNESS, recommendedOverT: 1.5 },
      ],
      absoluteOverT: 0.8,
      refuseBelow: false,
      source: 'shop rule: 1 T, over 6 mm 1.5 T',
      confidence: 'common-practice',
    },
    kBands: STEEL_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: commonPractice(0.15, `${V_SHARE}: 14 to 16 %`),
    kFrom: 'din6935',
    note: '',
  },
  {
    id: 'galv',
    name: 'Hot-dip galvanised DX51D+Z / A653 CS',
    shortName: 'Galvanised',
    family: 'steel',
    gaugeFamily: 'galvanised',
    densityKgPerM3: published(7850, `${EN_1993}; the zinc is under 1 % of the mass`),
    elasticModulusGpa: commonPractice(205, 'handbook range 200 to 210'),
    yieldMpa: null,
    ultimateMpa: published(500, 'EN 10346 DX51D: 270 to 500'),
    minimumRadius: radiusOverT(1, 0.5, 'shop rule; zinc flakes on very tight bends'),
    kBands: STEEL_BANDS,
    handbookK: HARD_GROUP,
    deliveredRadiusShare: commonPractice(0.16, `${V_SHARE}: as cold rolled steel, 15 to 17 %`),
    kFrom: 'din6935',
    note: 'Zinc fume is harmful: no welding or heating without extraction.',
  },
  {
    id: 'ss304',
    name: 'Stainless 304 / 1.4301, annealed',
    shortName: 'Stainless 304',
    family: 'stainless',
    gaugeFamily: 'stainless',
    densityKgPerM3: published(7900, 'EN 10088-1: 7.9 kg/dm³'),
    elasticModulusGpa: published(200, 'EN 10088-1'),
    yieldMpa: published(205, 'ASTM A240 S30400'),
    ultimateMpa: published(750, 'EN 10088-2 1.4301: 540 to 750 (ASTM A240: at least 515)'),
    minimumRadius: radiusOverT(1, 0.5, 'shop rule; Kalpakjian & Schmid give 0.5 T soft to 6 T hard'),
    kBands: STAINLESS_BANDS,
    handbookK: null,
    deliveredRadiusShare: commonPractice(0.21, `${V_SHARE}: 20 to 22 %`),
    kFrom: 'band',
    note: '',
  },
  {
    id: 'ss316',
    name: 'Stainless 316 / 1.4401, annealed',
    shortName: 'Stainless 316',
    family: 'stainless',
    gaugeFamily: 'stainless',
    densityKgPerM3: published(8000, 'EN 10088-1: 8.0 kg/dm³'),
    elasticModulusGpa: published(200, 'EN 10088-1'),
    yieldMpa: published(205, 'ASTM A240 S31600 (316L: 170)'),
    ultimateMpa: fromMemory(680, 'EN 10088-2 1.4401: 530 to 680 (ASTM A240: at least 515)'),
    minimumRadius: radiusOverT(1, 0.5, 'shop rule, as 304'),
    kBands: STAINLESS_BANDS,
    handbookK: null,
    deliveredRadiusShare: commonPractice(0.21, `${V_SHARE}: 20 to 22 %`),
    kFrom: 'band',
    note: '',
  },
  {
    id: 'al5052h32',
    name: 'Aluminium 5052-H32',
    shortName: 'Alloy 5052',
    family: 'aluminium',
    gaugeFamily: 'non-ferrous',
    densityKgPerM3: published(2680, AA),
    elasticModulusGpa: published(70.3, `${AA} (10.2 million psi)`),
    yieldMpa: published(160, B209),
    ultimateMpa: published(265, `${B209}: 215 to 265`),
    minimumRadius: aluminiumRadius([0, 0, 1, 1.5, 1.5, 1.5, 1.5, 2], false),
    kBands: ALLOY_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: commonPractice(0.14, `${V_SHARE}: 13 to 15 %`),
    kFrom: 'handbook',
    note: '',
  },
  {
    id: 'al6061t6',
    name: 'Aluminium 6061-T6',
    shortName: 'Alloy 6061-T6',
    family: 'aluminium',
    gaugeFamily: 'non-ferrous',
    densityKgPerM3: published(2700, AA),
    elasticModulusGpa: published(68.9, `${AA} (10.0 million psi)`),
    yieldMpa: published(240, B209),
    ultimateMpa: published(290, `${B209}: at least 290`),
    minimumRadius: aluminiumRadius([1, 1, 1.5, 2.5, 3, 3.5, 4.5, 5], true),
    kBands: ALLOY_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: fromMemory(0.14, `${V_SHARE}: no figure for this temper, taken as 5052`),
    kFrom: 'handbook',
    note: 'Cracks readily in T6. Shops bend it in T4 or O and age it, or take 5052-H32.',
  },
  {
    id: 'al3003h14',
    name: 'Aluminium 3003-H14',
    shortName: 'Alloy 3003',
    family: 'aluminium',
    gaugeFamily: 'non-ferrous',
    densityKgPerM3: published(2730, AA),
    elasticModulusGpa: published(68.9, AA),
    yieldMpa: published(115, B209),
    ultimateMpa: published(180, `${B209}: 140 to 180`),
    minimumRadius: aluminiumRadius([0, 0, 0, 1, 1, 1.5, 2, 2.5], false),
    kBands: SOFT_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: fromMemory(0.14, `${V_SHARE}: no figure for this temper, taken as 5052`),
    kFrom: 'handbook',
    note: '',
  },
  {
    id: 'al2024t3',
    name: 'Aluminium 2024-T3',
    shortName: 'Alloy 2024-T3',
    family: 'aluminium',
    gaugeFamily: 'non-ferrous',
    densityKgPerM3: published(2780, AA),
    elasticModulusGpa: published(73.1, `${AA} (10.6 million psi; MMPDS 10.5)`),
    yieldMpa: published(290, `${B209}, bare sheet`),
    ultimateMpa: fromMemory(435, `${B209}, bare sheet 0.010 to 0.128 in`),
    minimumRadius: aluminiumRadius([2.5, 3, 4, 5, 5, 6, 7, 7.5], true),
    kBands: ALLOY_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: fromMemory(0.14, `${V_SHARE}: no figure for this temper, taken as 5052`),
    kFrom: 'handbook',
    note: 'Bend it in O or freshly quenched; welds poorly.',
  },
  {
    id: 'cu110',
    name: 'Copper C11000, half-hard',
    shortName: 'Copper',
    family: 'copper',
    gaugeFamily: 'non-ferrous',
    densityKgPerM3: fromMemory(8910, 'Copper Development Association, C11000: 8890 to 8940'),
    elasticModulusGpa: published(117, 'Copper Development Association, 17 000 ksi'),
    yieldMpa: fromMemory(250, 'Copper Development Association, typical for H02'),
    ultimateMpa: fromMemory(315, 'ASTM B152, H02: 255 to 315'),
    minimumRadius: radiusOverT(1, null, 'shop rule for half-hard; annealed sheet bends to 0'),
    kBands: SOFT_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: scaledShare(315),
    kFrom: 'handbook',
    note: '',
  },
  {
    id: 'br260',
    name: 'Cartridge brass C26000, half-hard',
    shortName: 'Brass',
    family: 'brass',
    gaugeFamily: 'non-ferrous',
    densityKgPerM3: published(8530, 'Copper Development Association, C26000'),
    elasticModulusGpa: published(110, 'Copper Development Association, 16 000 ksi'),
    yieldMpa: fromMemory(360, 'Copper Development Association, typical for H02'),
    ultimateMpa: fromMemory(460, 'ASTM B36, H02: 395 to 460'),
    minimumRadius: radiusOverT(1, null, 'shop rule for half-hard; Kalpakjian & Schmid give 0 soft to 2 T hard'),
    kBands: SOFT_BANDS,
    handbookK: HALF_HARD_GROUP,
    deliveredRadiusShare: scaledShare(460),
    kFrom: 'handbook',
    note: 'Hard tempers crack along the grain; left under stress it can crack in ammonia.',
  },
  {
    id: 'ti2',
    name: 'Titanium grade 2',
    shortName: 'Titanium',
    family: 'other',
    gaugeFamily: null,
    densityKgPerM3: published(4510, 'ASTM B265'),
    elasticModulusGpa: commonPractice(103, 'handbook range 103 to 105'),
    yieldMpa: published(275, 'ASTM B265'),
    ultimateMpa: published(345, 'ASTM B265: at least 345'),
    minimumRadius: {
      rows: [{ upToThicknessMm: ANY_THICKNESS, recommendedOverT: 2.5 }],
      // The bend test names the mandrel's DIAMETER, 4 T in thin sheet: a radius of 2 T.
      absoluteOverT: 2,
      refuseBelow: false,
      source: 'ASTM B265 bend test, mandrel diameter 5 T (4 T below 1.8 mm)',
      confidence: 'memory',
    },
    kBands: airBendBands([0.36, 0.42], [0.4, 0.46], [0.44, 0.5]),
    handbookK: null,
    deliveredRadiusShare: scaledShare(345),
    kFrom: 'band',
    note: 'Springs back far; keep chlorinated fluids away; hot cutting discolours it.',
  },
];

const BY_ID: ReadonlyMap<string, SheetMaterial> = new Map(SHEET_MATERIALS.map((material) => [material.id, material]));

/** The material with this id, or null when the tables have none. */
export function findMaterial(materialId: string): SheetMaterial | null {
  return BY_ID.get(materialId) ?? null;
}
