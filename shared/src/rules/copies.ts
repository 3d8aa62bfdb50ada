import type { BendDeclaration, Feature, Layout, OutlineLoop } from '../bending/layout';
import { pointToLoop } from '../geometry/clearance';
import { loopBounds, loopFromBulges } from '../geometry/loop';
import type { Loop } from '../geometry/path';
import type { Bounds, Point } from '../geometry/point';
import { COINCIDENT_MM } from '../geometry/tolerance';
import { boundsMeet, cross, distance, dot, subtract, unit } from '../geometry/vector';
import { findHoleDiameterMm } from '../stock/hole-diameter';
import { DRAWN_TWICE, LIMIT_SLACK_MM } from './limits';

/** One thing and what was drawn again in its place, in document order. */
export interface Copies {
  readonly kind: 'bend' | 'hole' | 'slot' | 'cutout';
  readonly id: string;
  readonly copyIds: readonly string[];
}

/** Things that were drawn more than once: bends on one line, holes, slots and cut-outs in one place and of one size. */
export function findCopies({ bends, features, cutouts }: Layout): readonly Copies[] {
  const holes = features.filter(({ kind }) => kind === 'hole');
  const slots = features.filter(({ kind }) => kind === 'slot');
  const outlines = cutouts.flatMap((outline): readonly Outlined[] => {
    const loop = loopFromBulges(outline.edges);
    const bounds = loopBounds(loop);
    return bounds === null ? [] : [{ id: outline.id, outline, loop, bounds }];
  });
  return [
    ...copiesAmong('bend', bends, isSameLine, ({ line: { from, to } }) => Math.min(from.x, to.x)),
    ...copiesAmong('hole', holes, isSameOpening, leftOf),
    ...copiesAmong('slot', slots, isSameOpening, leftOf),
    ...copiesAmong('cutout', outlines, isSameOutline, ({ bounds }) => bounds.min.x),
  ];
}

/** Ids of the copies alone: what other rules leave out, so that one slip is told once. */
export function copyIds(layout: Layout): ReadonlySet<string> {
  return new Set(findCopies(layout).flatMap((copies) => copies.copyIds));
}

/** Sorted by their left end, so that only neighbours are compared; bends are few and may share a line from anywhere. */
function copiesAmong<Item extends { readonly id: string }>(
  kind: Copies['kind'],
  items: readonly Item[],
  isSame: (a: Item, b: Item) => boolean,
  left: (item: Item) => number,
): readonly Copies[] {
  const order = new Map(items.map((item, index) => [item.id, index]));
  const groups: { readonly first: Item; readonly all: Item[] }[] = [];
  let open: (typeof groups)[number][] = [];
  for (const item of [...items].sort((a, b) => left(a) - left(b))) {
    if (kind !== 'bend') open = open.filter(({ first }) => left(item) - left(first) <= REACH_MM);
    const known = open.find(({ first }) => isSame(first, item));
    if (known !== undefined) known.all.push(item);
    else {
      const group = { first: item, all: [item] };
      groups.push(group);
      open.push(group);
    }
  }
  return groups
    .filter(({ all }) => all.length > 1)
    .map(({ all }): Copies => {
      const [id = '', ...copies] = all.map((item) => item.id).sort((a, b) => (order.get(a) ?? 0) - (order.get(b) ?? 0));
      return { kind, id, copyIds: copies };
    });
}

/** How far apart the left ends of two copies may lie, mm; twice the limit leaves room for turned slots. */
const REACH_MM = 2 * DRAWN_TWICE.withinMm;

function isNear(a: number, b: number): boolean {
  return Math.abs(a - b) <= DRAWN_TWICE.withinMm + LIMIT_SLACK_MM;
}

function isAt(a: Point, b: Point): boolean {
  return isNear(distance(a, b), 0);
}

function leftOf(feature: Feature): number {
  return feature.kind === 'hole' ? feature.centre.x : Math.min(feature.from.x, feature.to.x);
}

function isSameOpening(a: Feature, b: Feature): boolean {
  if (a.kind === 'hole' && b.kind === 'hole') {
    const [first, second] = [findHoleDiameterMm(a.purpose), findHoleDiameterMm(b.purpose)];
    return isAt(a.centre, b.centre) && first !== null && second !== null && isNear(first, second);
  }
  if (a.kind !== 'slot' || b.kind !== 'slot' || !isNear(a.widthMm, b.widthMm)) return false;
  return (isAt(a.from, b.from) && isAt(a.to, b.to)) || (isAt(a.from, b.to) && isAt(a.to, b.from));
}

/** Whether two bend lines lie on one another for a stretch; bends of two tabs on one line are apart along it. */
function isSameLine({ line: a }: BendDeclaration, { line: b }: BendDeclaration): boolean {
  if (distance(a.from, a.to) <= COINCIDENT_MM) return false;
  const direction = unit(subtract(a.to, a.from));
  const isBeside = [b.from, b.to].some((end) => !isNear(cross(direction, subtract(end, a.from)), 0));
  const [from, to] = [b.from, b.to].map((end) => dot(direction, subtract(end, a.from)));
  if (isBeside || from === undefined || to === undefined) return false;
  const shared = Math.min(distance(a.from, a.to), Math.max(from, to)) - Math.max(0, Math.min(from, to));
  return shared > DRAWN_TWICE.withinMm;
}

interface Outlined {
  readonly id: string;
  readonly outline: OutlineLoop;
  readonly loop: Loop;
  readonly bounds: Bounds;
}

function isSameOutline(a: Outlined, b: Outlined): boolean {
  if (!boundsMeet(a.bounds, b.bounds, 0)) return false;
  return isOn(a, b) && isOn(b, a);
}

/** Whether corners and middles of one outline lie on the other. */
function isOn(one: Outlined, { loop, bounds }: Outlined): boolean {
  const isSameBox = (['x', 'y'] as const).every(
    (axis) => isNear(one.bounds.min[axis], bounds.min[axis]) && isNear(one.bounds.max[axis], bounds.max[axis]),
  );
  return (
    isSameBox &&
    one.outline.edges.every(({ start }) => isNear(pointToLoop(start, loop)?.distanceMm ?? Number.POSITIVE_INFINITY, 0))
  );
}
