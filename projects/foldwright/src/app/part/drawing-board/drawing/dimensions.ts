import type { FlatPattern } from '@foldwright/shared/bending/development';
import type { Layout } from '@foldwright/shared/bending/layout';
import type { Bounds, Point } from '@foldwright/shared/geometry/point';
import { pointAt } from '@foldwright/shared/geometry/segment';
import { formatDecimal } from '@foldwright/shared/units/length';
import type { EntityRef } from '../geometry/entity';
import { edgesOfLoop, featureCentre, findFeature, layoutBounds } from '../geometry/layout-edges';
import { type Viewport, toScreen } from '../viewport';

/** One dimension in pixels of the board, as a person would write it: line, oblique ticks, figure. */
export interface DrawnDimension {
  readonly key: string;
  readonly line: string;
  readonly ticks: string;
  /** Thin lines from the drawing to the dimension line. */
  readonly extensions: string;
  readonly text: string;
  readonly xPx: number;
  readonly yPx: number;
  readonly turnDeg: 0 | -90;
  /** On the metal it is scribed, on the card it is in ink. */
  readonly isOnMetal: boolean;
}

/** Distance of a chain of dimensions from the sheet, px, and how far extensions reach past it. */
const CHAIN_OFFSET_PX = 36;
const EXTENSION_PAST_PX = 9;
const EXTENSION_GAP_PX = 12;
/** A figure needs this much room or it is left out; the list has every size. */
const LEAST_ROOM_PX = 26;

/** What chains of dimensions are hung on: the ends of a sheet, its creases and its corners, mm. */
export interface ChainSource {
  readonly bounds: Bounds;
  readonly creases: readonly { readonly from: Point; readonly to: Point }[];
  readonly corners: readonly Point[];
}

/** Ends, creases and corners of a layout; null for one without an outline. */
export function layoutChain(layout: Layout): ChainSource | null {
  const bounds = layoutBounds(layout);
  if (bounds === null) return null;
  const corners = edgesOfLoop(layout.outer).flatMap(({ segment }) => [segment.from, pointAt(segment, 0.5)]);
  return { bounds, creases: layout.bends.map((bend) => bend.line), corners };
}

/** The same of a flat pattern: its creases are the middles of the bend zones. */
export function flatChain(flat: FlatPattern): ChainSource {
  const corners = flat.outer.flatMap((segment) => [segment.from, pointAt(segment, 0.5)]);
  return { bounds: flat.bounds, creases: flat.bends.flatMap((bend) => bend.centreLines), corners };
}

/**
 * Chains along the bottom and the left of the sheet: from edge to bend to edge. Positions of bends count only where
 * they are square to the chain.
 */
export function chainDimensions(source: ChainSource | null, viewport: Viewport): readonly DrawnDimension[] {
  if (source === null) return [];
  const { min, max } = source.bounds;
  const low = toScreen(viewport, min);
  const across = stations(source, 'x', min.x, max.x);
  const upwards = stations(source, 'y', min.y, max.y);
  const bottom = low.yPx + CHAIN_OFFSET_PX;
  const left = low.xPx - CHAIN_OFFSET_PX;
  return [
    ...pairs(across).map(([a, b]) => {
      const from = toScreen(viewport, { x: a.at, y: min.y });
      const to = toScreen(viewport, { x: b.at, y: min.y });
      const starts = [a, b].map((station) => toScreen(viewport, { x: station.at, y: station.fromMm }).yPx);
      return level(`x${a.at}`, from.xPx, to.xPx, bottom, starts, b.at - a.at);
    }),
    ...pairs(upwards).map(([a, b]) => {
      const from = toScreen(viewport, { x: min.x, y: a.at });
      const to = toScreen(viewport, { x: min.x, y: b.at });
      const starts = [a, b].map((station) => toScreen(viewport, { x: station.fromMm, y: station.at }).xPx);
      return plumb(`y${a.at}`, from.yPx, to.yPx, left, starts, b.at - a.at);
    }),
  ].filter((dimension) => dimension.text !== '');
}

/** Where a hole, slot or bend stands, from the nearest ends of the sheet: drawn while it is chosen. */
export function placeDimensions(
  layout: Layout,
  selection: EntityRef | null,
  viewport: Viewport,
): readonly DrawnDimension[] {
  if (selection === null || (selection.kind !== 'hole' && selection.kind !== 'slot')) return [];
  const feature = findFeature(layout, selection.id);
  if (feature === null) return [];
  const centre = featureCentre(feature);
  const toLeft = reach(layout, centre, { x: -1, y: 0 });
  const toBottom = reach(layout, centre, { x: 0, y: -1 });
  const at = toScreen(viewport, centre);
  const found: DrawnDimension[] = [];
  if (toLeft !== null) {
    const edge = toScreen(viewport, { x: centre.x - toLeft, y: centre.y });
    found.push({ ...level('from-left', edge.xPx, at.xPx, at.yPx, [], toLeft), isOnMetal: true });
  }
  if (toBottom !== null) {
    const edge = toScreen(viewport, { x: centre.x, y: centre.y - toBottom });
    found.push({ ...plumb('from-bottom', edge.yPx, at.yPx, at.xPx, [], toBottom), isOnMetal: true });
  }
  return found;
}

interface Station {
  readonly at: number;
  /** Where its extension line begins, in the other coordinate, mm. */
  readonly fromMm: number;
}

/** The ends of the sheet and the bends square to the axis, rising, with coinciding ones once. */
function stations(source: ChainSource, axis: 'x' | 'y', low: number, high: number): readonly Station[] {
  const other = axis === 'x' ? 'y' : 'x';
  const found: Station[] = [
    { at: low, fromMm: nearestCorner(source, axis, low) },
    { at: high, fromMm: nearestCorner(source, axis, high) },
  ];
  for (const { from, to } of source.creases) {
    if (Math.abs(from[axis] - to[axis]) > 0.01) continue;
    found.push({ at: from[axis], fromMm: Math.min(from[other], to[other]) });
  }
  found.sort((a, b) => a.at - b.at);
  return found.filter((station, index) => index === 0 || station.at - (found[index - 1]?.at ?? -Infinity) > 0.05);
}

function nearestCorner(source: ChainSource, axis: 'x' | 'y', at: number): number {
  const other = axis === 'x' ? 'y' : 'x';
  const near = source.corners.filter((point) => Math.abs(point[axis] - at) < 0.5).map((point) => point[other]);
  return near.length === 0 ? source.bounds.min[other] : Math.min(...near);
}

function pairs(all: readonly Station[]): readonly (readonly [Station, Station])[] {
  return all.flatMap((station, index) => {
    const next = all[index + 1];
    return next === undefined ? [] : [[station, next] as const];
  });
}

const tick = (x: number, y: number): string => `M${x - 4} ${y + 4}l8 -8`;

function level(
  key: string,
  fromPx: number,
  toPx: number,
  yPx: number,
  starts: readonly number[],
  valueMm: number,
): DrawnDimension {
  return {
    key,
    line: `M${fromPx} ${yPx}H${toPx}`,
    ticks: tick(fromPx, yPx) + tick(toPx, yPx),
    extensions: starts
      .map((start, index) => {
        const x = index === 0 ? fromPx : toPx;
        return `M${x} ${Math.min(start + EXTENSION_GAP_PX, yPx)}V${yPx + EXTENSION_PAST_PX}`;
      })
      .join(''),
    text: Math.abs(toPx - fromPx) < LEAST_ROOM_PX ? '' : formatDecimal(valueMm, 1),
    xPx: (fromPx + toPx) / 2,
    yPx: yPx - 5,
    turnDeg: 0,
    isOnMetal: false,
  };
}

function plumb(
  key: string,
  fromPx: number,
  toPx: number,
  xPx: number,
  starts: readonly number[],
  valueMm: number,
): DrawnDimension {
  return {
    key,
    line: `M${xPx} ${fromPx}V${toPx}`,
    ticks: tick(xPx, fromPx) + tick(xPx, toPx),
    extensions: starts
      .map((start, index) => {
        const y = index === 0 ? fromPx : toPx;
        return `M${Math.max(start - EXTENSION_GAP_PX, xPx)} ${y}H${xPx - EXTENSION_PAST_PX}`;
      })
      .join(''),
    text: Math.abs(toPx - fromPx) < LEAST_ROOM_PX ? '' : formatDecimal(valueMm, 1),
    xPx: xPx - 5,
    yPx: (fromPx + toPx) / 2,
    turnDeg: -90,
    isOnMetal: false,
  };
}

/** Distance from a point to the outline in a level or plumb direction, mm; null when nothing lies there. */
function reach(layout: Layout, from: Point, direction: Point): number | null {
  const axis = direction.x === 0 ? 'y' : 'x';
  const other = axis === 'x' ? 'y' : 'x';
  let best: number | null = null;
  for (const { segment } of edgesOfLoop(layout.outer)) {
    const { from: a, to: b } = segment;
    const [low, high] = [Math.min(a[other], b[other]), Math.max(a[other], b[other])];
    if (from[other] < low || from[other] > high || low === high) continue;
    const at = a[axis] + ((b[axis] - a[axis]) * (from[other] - a[other])) / (b[other] - a[other]);
    const away = from[axis] - at;
    if (away > 0 && (best === null || away < best)) best = away;
  }
  return best;
}
