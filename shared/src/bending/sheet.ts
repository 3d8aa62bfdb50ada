import {
  circleLoop,
  clockwise,
  counterClockwise,
  loopFromBulges,
  pointInLoop,
  signedArea,
  slotLoop,
} from '../geometry/loop';
import { findCrossings } from '../geometry/loop-crossings';
import type { Loop } from '../geometry/path';
import { COINCIDENT_MM, TINY_AREA_MM2 } from '../geometry/tolerance';
import { findHoleDiameterMm } from '../stock/hole-diameter';
import type { DevelopmentProblem } from './development';
import type { Feature, HoleFeature, Layout, OutlineLoop, SlotFeature } from './layout';

/** An opening that is not a free cut-out, with the size that its purpose asks for. */
export type SizedFeature =
  | { readonly feature: HoleFeature; readonly diameterMm: number; readonly loop: Loop }
  | { readonly feature: SlotFeature; readonly diameterMm: null; readonly loop: Loop };

/** The layout as exact geometry: the outline counter-clockwise, all openings clockwise. */
export interface Sheet {
  readonly outer: Loop;
  readonly cutouts: readonly { readonly id: string; readonly loop: Loop }[];
  readonly features: readonly SizedFeature[];
}

export type SheetResult =
  | { readonly ok: true; readonly sheet: Sheet }
  | { readonly ok: false; readonly problems: readonly DevelopmentProblem[] };

/**
 * Reads a layout's outline and openings and refuses what cannot be cut: boundaries that touch or cross, openings outside the
 * sheet or inside each other, holes of no known size. Every problem found is named, not only the first.
 */
export function readSheet(layout: Layout): SheetResult {
  const problems: DevelopmentProblem[] = [];
  const outer = readLoop(layout.outer, 'The outline', problems);
  const cutouts = layout.cutouts.map((cutout) => ({
    id: cutout.id,
    loop: readLoop(cutout, `Cut-out ${cutout.id}`, problems),
  }));
  const features: SizedFeature[] = [];
  for (const feature of layout.features) {
    const sized = sizeFeature(feature);
    if (sized === null)
      problems.push({
        code: 'holeUnknown',
        message: `Opening ${feature.id} has no size that can be cut.`,
        ids: [feature.id],
      });
    else features.push(sized);
  }
  if (problems.length > 0) return { ok: false, problems };
  const named = [
    { id: layout.outer.id, loop: outer },
    ...cutouts,
    ...features.map(({ feature, loop }) => ({ id: feature.id, loop })),
  ];
  problems.push(...touchingBoundaries(named, [layout.outer, ...layout.cutouts]), ...misplacedOpenings(named));
  if (problems.length > 0) return { ok: false, problems };
  return {
    ok: true,
    sheet: {
      outer: counterClockwise(outer),
      cutouts: cutouts.map(({ id, loop }) => ({ id, loop: clockwise(loop) })),
      features,
    },
  };
}

function readLoop(outline: OutlineLoop, name: string, problems: DevelopmentProblem[]): Loop {
  const isFinite = outline.edges.every((edge) => [edge.start.x, edge.start.y, edge.bulge].every(Number.isFinite));
  const loop = isFinite ? loopFromBulges(outline.edges) : [];
  if (loop.length < 2 || !(Math.abs(signedArea(loop)) > TINY_AREA_MM2)) {
    problems.push({ code: 'outlineNotSimple', message: `${name} encloses nothing.`, ids: [outline.id] });
    return [];
  }
  return loop;
}

function sizeFeature(feature: Feature): SizedFeature | null {
  if (feature.kind === 'slot') {
    const values = [feature.from.x, feature.from.y, feature.to.x, feature.to.y];
    if (!values.every(Number.isFinite) || !(feature.widthMm > 0) || !Number.isFinite(feature.widthMm)) return null;
    return { feature, diameterMm: null, loop: clockwise(slotLoop(feature.from, feature.to, feature.widthMm)) };
  }
  const diameterMm = findHoleDiameterMm(feature.purpose);
  if (diameterMm === null || !(diameterMm > 0) || !Number.isFinite(diameterMm)) return null;
  if (!Number.isFinite(feature.centre.x) || !Number.isFinite(feature.centre.y)) return null;
  return { feature, diameterMm, loop: clockwise(circleLoop(feature.centre, diameterMm / 2)) };
}

interface NamedLoop {
  readonly id: string;
  readonly loop: Loop;
}

function touchingBoundaries(
  named: readonly NamedLoop[],
  outlines: readonly OutlineLoop[],
): readonly DevelopmentProblem[] {
  const seen = new Map<string, DevelopmentProblem>();
  for (const crossing of findCrossings(
    named.map(({ loop }) => loop),
    COINCIDENT_MM,
  )) {
    const first = named[crossing.first.loopIndex]?.id ?? '';
    const second = named[crossing.second.loopIndex]?.id ?? '';
    const ids = [...new Set([first, second])];
    const key = [...ids].sort().join(' ');
    if (seen.has(key)) continue;
    const edges = [crossing.first, crossing.second].flatMap(({ loopIndex, segmentIndex }) => {
      const from = named[loopIndex]?.loop[segmentIndex]?.from;
      const edge = outlines[loopIndex]?.edges.find((one) => one.start.x === from?.x && one.start.y === from.y);
      return edge === undefined ? [] : [edge.id];
    });
    const where = `at ${crossing.at.x.toFixed(2)}, ${crossing.at.y.toFixed(2)} mm`;
    const message =
      ids.length === 1 ? `A boundary crosses or touches itself ${where}.` : `Two boundaries cross or touch ${where}.`;
    seen.set(key, { code: 'outlineNotSimple', message, ids: [...ids, ...edges] });
  }
  return [...seen.values()];
}

function misplacedOpenings(named: readonly NamedLoop[]): readonly DevelopmentProblem[] {
  const [outer, ...openings] = named;
  if (outer === undefined) return [];
  const problems: DevelopmentProblem[] = [];
  const boxes = openings.map((opening) => ({ ...opening, corner: opening.loop[0]?.from ?? { x: 0, y: 0 } }));
  for (const opening of boxes) {
    if (pointInLoop(opening.corner, outer.loop, 0) === 'outside') {
      problems.push({
        code: 'outlineNotSimple',
        message: `Opening ${opening.id} lies outside the outline.`,
        ids: [opening.id],
      });
    }
    for (const other of boxes) {
      if (other === opening || pointInLoop(opening.corner, other.loop, 0) === 'outside') continue;
      const message = `Opening ${opening.id} lies inside opening ${other.id}.`;
      problems.push({ code: 'outlineNotSimple', message, ids: [opening.id, other.id] });
    }
  }
  return problems;
}
