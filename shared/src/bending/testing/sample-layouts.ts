import type { Point } from '../../geometry/point';
import type { BendingStock } from '../development';
import type {
  BendDeclaration,
  BendDirection,
  Feature,
  Layout,
  LengthReference,
  OutlineLoop,
  ReliefSettings,
} from '../layout';

/** A bend of a sample as far as samples vary it. */
export interface SampleBend {
  readonly bendAngleDeg?: number;
  readonly direction?: BendDirection;
  readonly reference?: LengthReference;
  readonly insideRadiusMm?: number | null;
  readonly kFactor?: number;
  readonly sideEdges?: BendDeclaration['sideEdges'];
}

const RELIEFS: ReliefSettings = { mode: 'automatic', widthMm: null, depthMm: null, shape: 'obround' };

/** Mild steel 2 mm with every value of the stock open to change; K comes from DIN 6935 unless a table is given. */
export function sampleStock(changes: Partial<BendingStock> = {}): BendingStock {
  return {
    materialId: 'dc01',
    materialName: 'Mild steel DC01',
    family: 'steel',
    thicknessMm: 2,
    densityKgPerM3: 7850,
    deliveredRadiusMm: 2,
    vOpeningMm: 16,
    ultimateStrengthMpa: 410,
    kBands: [],
    kTable: [],
    ...changes,
  };
}

/** A closed chain of straight edges; ids are the loop's id with a number. */
export function sampleLoop(id: string, points: readonly Point[]): OutlineLoop {
  return { id, edges: points.map((start, index) => ({ id: `${id}-${String(index + 1)}`, start, bulge: 0 })) };
}

/** A bend on a line, square, towards, to the inside apex and with the stock's radius unless told otherwise. */
export function sampleBend(id: string, from: Point, to: Point, bend: SampleBend = {}): BendDeclaration {
  return {
    id,
    line: { from, to },
    bendAngleDeg: bend.bendAngleDeg ?? 90,
    direction: bend.direction ?? 'towards',
    lengths: { from: 'reference', reference: bend.reference ?? 'insideApex' },
    insideRadiusMm: bend.insideRadiusMm ?? null,
    override: bend.kFactor === undefined ? null : { kind: 'kFactor', kFactor: bend.kFactor, reason: 'sample' },
    sideEdges: bend.sideEdges ?? 'trimmed',
  };
}

/** A layout of an outline and bends; the anchor has to lie in the base panel. */
export function sampleLayout(parts: {
  readonly outer: readonly Point[];
  readonly bends: readonly BendDeclaration[];
  readonly baseAnchor: Point;
  readonly features?: readonly Feature[];
  readonly cutouts?: readonly OutlineLoop[];
  readonly reliefs?: Partial<ReliefSettings>;
}): Layout {
  return {
    outer: sampleLoop('outer', parts.outer),
    cutouts: parts.cutouts ?? [],
    features: parts.features ?? [],
    bends: parts.bends,
    reliefs: { ...RELIEFS, ...parts.reliefs },
    baseAnchor: parts.baseAnchor,
  };
}

/**
 * A strip along x, bent across: legs from left to right, a bend between each two of them.
 * @param basePanel index of the leg that stays put; the first by default.
 */
export function stripLayout(
  legsMm: readonly number[],
  bends: readonly SampleBend[],
  widthMm = 40,
  basePanel = 0,
): Layout {
  const ends = legsMm.map((_, index) => legsMm.slice(0, index + 1).reduce((sum, leg) => sum + leg, 0));
  const total = ends.at(-1) ?? 0;
  const baseStart = ends[basePanel - 1] ?? 0;
  return sampleLayout({
    outer: [
      { x: 0, y: 0 },
      { x: total, y: 0 },
      { x: total, y: widthMm },
      { x: 0, y: widthMm },
    ],
    bends: bends.map((bend, index) =>
      sampleBend(
        `bend-${String(index + 1)}`,
        { x: ends[index] ?? 0, y: -5 },
        { x: ends[index] ?? 0, y: widthMm + 5 },
        bend,
      ),
    ),
    baseAnchor: { x: (baseStart + (ends[basePanel] ?? total)) / 2, y: widthMm / 2 },
  });
}

/** L of two outside legs. */
export function lLayout(firstMm = 50, secondMm = 30, bend: SampleBend = {}): Layout {
  return stripLayout([firstMm, secondMm], [{ reference: 'outsideApex', ...bend }]);
}

/** U of a web and two flanges, outside sizes; the web is the base. */
export function uLayout(flangeMm = 30, webMm = 60, bend: SampleBend = {}): Layout {
  const both = { reference: 'outsideApex', ...bend } as const;
  return stripLayout([flangeMm, webMm, flangeMm], [both, both], 40, 1);
}

/** Z of a web and two flanges that point opposite ways; the web is measured over everything. */
export function zLayout(firstMm = 25, webMm = 40, secondMm = 25, bend: SampleBend = {}): Layout {
  const both = { reference: 'outsideApex', ...bend } as const;
  return stripLayout([firstMm, webMm, secondMm], [both, { ...both, direction: 'away' }]);
}

/** Hat of a crown, two sides and two brims, outside sizes; the crown is the base. */
export function hatLayout(brimMm = 20, sideMm = 25, crownMm = 50, bend: SampleBend = {}): Layout {
  const towards = { reference: 'outsideApex', direction: 'towards', ...bend } as const;
  const away = { ...towards, direction: 'away' } as const;
  return stripLayout([brimMm, sideMm, crownMm, sideMm, brimMm], [away, towards, towards, away], 40, 2);
}

/** Tray with four flanges, corners notched to where the bend lines meet; inside base `lengthMm` x `widthMm`. */
export function trayLayout(lengthMm = 100, widthMm = 60, flangeMm = 20, bend: SampleBend = {}): Layout {
  const [l, w, f] = [lengthMm, widthMm, flangeMm];
  return sampleLayout({
    outer: [
      { x: 0, y: 0 },
      { x: 0, y: -f },
      { x: l, y: -f },
      { x: l, y: 0 },
      { x: l + f, y: 0 },
      { x: l + f, y: w },
      { x: l, y: w },
      { x: l, y: w + f },
      { x: 0, y: w + f },
      { x: 0, y: w },
      { x: -f, y: w },
      { x: -f, y: 0 },
    ],
    bends: [
      sampleBend('front', { x: 0, y: 0 }, { x: l, y: 0 }, bend),
      sampleBend('right', { x: l, y: 0 }, { x: l, y: w }, bend),
      sampleBend('back', { x: l, y: w }, { x: 0, y: w }, bend),
      sampleBend('left', { x: 0, y: w }, { x: 0, y: 0 }, bend),
    ],
    baseAnchor: { x: l / 2, y: w / 2 },
  });
}

/** A plate with a tab narrower than its edge, so that the bend ends beside sheet that stays flat. */
export function tabLayout(bend: SampleBend = {}, reliefs: Partial<ReliefSettings> = {}): Layout {
  return sampleLayout({
    outer: [
      { x: 0, y: -50 },
      { x: 80, y: -50 },
      { x: 80, y: 0 },
      { x: 60, y: 0 },
      { x: 60, y: 25 },
      { x: 20, y: 25 },
      { x: 20, y: 0 },
      { x: 0, y: 0 },
    ],
    bends: [sampleBend('tab', { x: 20, y: 0 }, { x: 60, y: 0 }, bend)],
    baseAnchor: { x: 40, y: -30 },
    reliefs,
  });
}

/** A cradle for a hand grinder: a back plate, two cheeks bent towards at 90, a lip at 75 and a foot bent away at 75. */
export function cradleLayout(bend: SampleBend = {}): Layout {
  return sampleLayout({
    outer: [
      { x: -35, y: 10 },
      { x: 0, y: 0 },
      { x: 0, y: -30 },
      { x: 90, y: -30 },
      { x: 90, y: 0 },
      { x: 125, y: 10 },
      { x: 125, y: 50 },
      { x: 90, y: 60 },
      { x: 90, y: 95 },
      { x: 0, y: 95 },
      { x: 0, y: 60 },
      { x: -35, y: 50 },
    ],
    bends: [
      sampleBend('left-cheek', { x: 0, y: 60 }, { x: 0, y: 0 }, bend),
      sampleBend('right-cheek', { x: 90, y: 0 }, { x: 90, y: 60 }, bend),
      sampleBend('lip', { x: 0, y: 0 }, { x: 90, y: 0 }, { bendAngleDeg: 75, ...bend }),
      sampleBend('foot', { x: 0, y: 60 }, { x: 90, y: 60 }, { bendAngleDeg: 75, direction: 'away', ...bend }),
    ],
    features: [
      { kind: 'hole', id: 'h1', centre: { x: 20, y: 30 }, purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' } },
      { kind: 'hole', id: 'h2', centre: { x: 70, y: 30 }, purpose: { kind: 'clearance', thread: 'M6', fit: 'medium' } },
      { kind: 'slot', id: 's1', from: { x: 35, y: 82 }, to: { x: 55, y: 82 }, widthMm: 6.6 },
    ],
    baseAnchor: { x: 45, y: 30 },
  });
}
