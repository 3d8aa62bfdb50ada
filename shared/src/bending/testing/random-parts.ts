import fc from 'fast-check';
import type { Point } from '../../geometry/point';
import type { BendDeclaration, Feature, Layout, ReliefSettings } from '../layout';
import { sampleBend, sampleLayout } from './sample-layouts';

/** A flange on one side of the plate, as far as random parts vary it. */
export interface RandomFlange {
  /** Left out when false. */
  readonly isThere: boolean;
  /** Share of the side that stays free before and after the flange. */
  readonly before: number;
  readonly after: number;
  readonly heightMm: number;
  /** How much each side edge leans in (positive) or out, as a share of the height. */
  readonly leanBefore: number;
  readonly leanAfter: number;
  readonly bendAngleDeg: number;
  readonly direction: BendDeclaration['direction'];
  /** Height of a second flange on the first, 0 for none. */
  readonly returnMm: number;
  readonly returnDirection: BendDeclaration['direction'];
}

/** A plate with up to four flanges, some with returns, and holes. */
export interface RandomPart {
  readonly widthMm: number;
  readonly heightMm: number;
  readonly flanges: readonly RandomFlange[];
  /** Holes near the middle of a side, so far outwards from its bend line. */
  readonly holes: readonly {
    readonly side: number;
    readonly sideways: number;
    readonly outMm: number;
    readonly diameterMm: number;
  }[];
  readonly reliefs: Pick<ReliefSettings, 'mode' | 'shape'>;
  readonly sideEdges: BendDeclaration['sideEdges'];
  readonly turnDeg: number;
}

/** Even spread in steps of a thousandth, where doubles would crowd at the ends of the range. */
const share = (min: number, max: number): fc.Arbitrary<number> =>
  fc.integer({ min: Math.round(min * 1000), max: Math.round(max * 1000) }).map((thousandths) => thousandths / 1000);
const direction = fc.constantFrom('towards' as const, 'away' as const);

const flange: fc.Arbitrary<RandomFlange> = fc.record({
  isThere: fc.boolean(),
  before: fc.oneof(fc.constant(0), share(0.1, 0.3)),
  after: fc.oneof(fc.constant(0), share(0.1, 0.3)),
  heightMm: share(15, 40),
  leanBefore: fc.oneof(fc.constant(0), share(-0.2, 0.4)),
  leanAfter: fc.oneof(fc.constant(0), share(-0.2, 0.4)),
  bendAngleDeg: fc.oneof(fc.constant(90), share(10, 120)),
  direction,
  returnMm: fc.oneof(fc.constant(0), share(8, 20)),
  returnDirection: direction,
});

/** Random plates of 80 to 200 mm with flanges, returns, holes and reliefs, turned by any angle in the plane. */
export const randomPart: fc.Arbitrary<RandomPart> = fc.record({
  widthMm: share(80, 200),
  heightMm: share(80, 200),
  flanges: fc.array(flange, { minLength: 4, maxLength: 4 }),
  holes: fc.array(
    fc.record({ side: fc.nat(3), sideways: share(0.35, 0.65), outMm: share(-12, 12), diameterMm: share(2, 9) }),
    { maxLength: 3 },
  ),
  reliefs: fc.record({
    mode: fc.constantFrom('automatic' as const, 'none' as const),
    shape: fc.constantFrom('obround' as const, 'rectangular' as const),
  }),
  sideEdges: fc.constantFrom('trimmed' as const, 'blended' as const),
  turnDeg: fc.oneof(fc.constant(0), share(0, 360)),
});

/** The layout of a random part. Holes may fall into bend zones. */
export function layoutOfPart(part: RandomPart): Layout {
  const { widthMm: w, heightMm: h } = part;
  const corners: readonly Point[] = [
    { x: 0, y: 0 },
    { x: w, y: 0 },
    { x: w, y: h },
    { x: 0, y: h },
  ];
  const outer: Point[] = [];
  const bends: BendDeclaration[] = [];
  part.flanges.forEach((one, side) => {
    const start = corners[side] ?? { x: 0, y: 0 };
    const end = corners[(side + 1) % 4] ?? { x: 0, y: 0 };
    const length = Math.hypot(end.x - start.x, end.y - start.y);
    const along = { x: (end.x - start.x) / length, y: (end.y - start.y) / length };
    const out = { x: along.y, y: -along.x };
    const at = (sideways: number, outwards: number): Point => ({
      x: start.x + along.x * sideways + out.x * outwards,
      y: start.y + along.y * sideways + out.y * outwards,
    });
    outer.push(start);
    if (!one.isThere) return;
    const from = length * one.before;
    const to = length * (1 - one.after);
    const lean = { before: one.leanBefore * one.heightMm, after: one.leanAfter * one.heightMm };
    const top = { from: from + lean.before, to: to - lean.after };
    const bend = { bendAngleDeg: one.bendAngleDeg, direction: one.direction, sideEdges: part.sideEdges };
    if (one.before > 0) outer.push(at(from, 0));
    bends.push(sampleBend(`side-${String(side)}`, at(from, 0), at(to, 0), bend));
    outer.push(at(top.from, one.heightMm));
    if (one.returnMm > 0) {
      outer.push(at(top.from, one.heightMm + one.returnMm), at(top.to, one.heightMm + one.returnMm));
      const folded = { bendAngleDeg: 90, direction: one.returnDirection, sideEdges: part.sideEdges };
      bends.push(sampleBend(`return-${String(side)}`, at(top.from, one.heightMm), at(top.to, one.heightMm), folded));
    }
    outer.push(at(top.to, one.heightMm));
    if (one.after > 0) outer.push(at(to, 0));
  });
  const features = part.holes.flatMap((hole, index): readonly Feature[] => {
    const start = corners[hole.side] ?? { x: 0, y: 0 };
    const end = corners[(hole.side + 1) % 4] ?? { x: 0, y: 0 };
    const length = Math.hypot(end.x - start.x, end.y - start.y);
    const along = { x: (end.x - start.x) / length, y: (end.y - start.y) / length };
    const outMm = part.flanges[hole.side]?.isThere === true ? hole.outMm : Math.min(hole.outMm, -hole.diameterMm);
    const centre = {
      x: start.x + along.x * hole.sideways * length + along.y * outMm,
      y: start.y + along.y * hole.sideways * length - along.x * outMm,
    };
    return [
      { kind: 'hole', id: `hole-${String(index)}`, centre, purpose: { kind: 'plain', diameterMm: hole.diameterMm } },
    ];
  });
  return turned(
    sampleLayout({ outer, bends, features, baseAnchor: { x: w / 2, y: h / 2 }, reliefs: part.reliefs }),
    part.turnDeg,
  );
}

/** A layout of straight edges and holes turned about the origin. */
export function turned(layout: Layout, turnDeg: number): Layout {
  const [cosine, sine] = [Math.cos((turnDeg * Math.PI) / 180), Math.sin((turnDeg * Math.PI) / 180)];
  return mapped(layout, ({ x, y }) => ({ x: x * cosine - y * sine, y: x * sine + y * cosine }), false);
}

/** A layout seen from behind: mirrored in the y axis, with towards and away swapped. */
export function mirrored(layout: Layout): Layout {
  const image = mapped(layout, ({ x, y }) => ({ x: -x, y }), true);
  return {
    ...image,
    bends: image.bends.map((bend) => ({ ...bend, direction: bend.direction === 'towards' ? 'away' : 'towards' })),
  };
}

function mapped(layout: Layout, move: (point: Point) => Point, isMirror: boolean): Layout {
  const chain = (loop: Layout['outer']): Layout['outer'] => ({
    ...loop,
    edges: loop.edges.map((edge) => ({ ...edge, start: move(edge.start), bulge: isMirror ? -edge.bulge : edge.bulge })),
  });
  return {
    ...layout,
    outer: chain(layout.outer),
    cutouts: layout.cutouts.map(chain),
    features: layout.features.map((feature) =>
      feature.kind === 'hole'
        ? { ...feature, centre: move(feature.centre) }
        : { ...feature, from: move(feature.from), to: move(feature.to) },
    ),
    bends: layout.bends.map((bend) => ({ ...bend, line: { from: move(bend.line.from), to: move(bend.line.to) } })),
    baseAnchor: move(layout.baseAnchor),
  };
}
