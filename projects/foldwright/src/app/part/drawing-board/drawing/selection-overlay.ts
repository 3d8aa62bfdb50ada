import type { Layout } from '@foldwright/shared/bending/layout';
import type { Point } from '@foldwright/shared/geometry/point';
import { pointAt, tangentAt } from '@foldwright/shared/geometry/segment';
import { distance, turnRight } from '@foldwright/shared/geometry/vector';
import { roundedCorner } from '@foldwright/shared/part/outline-edge-sizes';
import { findHoleDiameterMm } from '@foldwright/shared/stock/hole-diameter';
import type { BoardOverlay } from '../canvas/board-overlay';
import { type EntityRef, isSameEntity } from '../geometry/entity';
import { type PlacedEdge, edgesOfLayout, findBend, findEdge, findFeature } from '../geometry/layout-edges';
import { circlePath, obroundPath, openPath } from '../geometry/svg-path';
import { SNAP_WORDS } from '../snapping/snap';
import type { EditorState } from '../tools/editor';
import { type ScreenPoint, type Viewport, toScreen } from '../viewport';

/** How far from the edge its field and dimension line stand, px. */
const MEASURE_OFFSET_PX = 24;
const MEASURE_PAST_PX = 6;

/** Path data of a thing, layout coordinates; empty for a corner, which has a handle instead. */
export function entityPath(layout: Layout, ref: EntityRef | null): string {
  if (ref === null || ref.kind === 'vertex') return '';
  if (ref.kind === 'edge') {
    const placed = findEdge(layout, ref.id);
    return placed === null ? '' : openPath(placed.segment);
  }
  if (ref.kind === 'bend') {
    const bend = findBend(layout, ref.id);
    return bend === null ? '' : `M${bend.line.from.x} ${bend.line.from.y}L${bend.line.to.x} ${bend.line.to.y}`;
  }
  const feature = findFeature(layout, ref.id);
  if (feature === null) return '';
  if (feature.kind === 'slot') return obroundPath(feature.from, feature.to, feature.widthMm);
  return circlePath(feature.centre, findHoleDiameterMm(feature.purpose) ?? 0);
}

/** What is drawn over the sheet while a hand works: chalk on what is chosen, handles, guides of a snap. */
export function overlayOf(layout: Layout, editor: EditorState, viewport: Viewport, hasHandles: boolean): BoardOverlay {
  const { selection, hover, snap } = editor;
  const guides = (snap?.guides ?? []).map(({ from, to }) => {
    const [a, b] = [toScreen(viewport, from), toScreen(viewport, to)];
    return `M${a.xPx} ${a.yPx}L${b.xPx} ${b.yPx}`;
  });
  return {
    picked: entityPath(layout, selection),
    hovered: isSameEntity(hover, selection) ? '' : entityPath(layout, hover),
    handles: hasHandles ? handlesOf(layout, editor, viewport) : [],
    guides: guides.join(''),
    snapWord: snap === null ? '' : SNAP_WORDS[snap.kind],
    snapAt: snap === null || snap.kind === 'none' ? null : toScreen(viewport, snap.point),
    measure: selection?.kind === 'edge' ? measurePath(layout, selection.id, viewport) : '',
  };
}

/** Corners show while one of them, or an edge beside them, is chosen or pointed at. */
function handlesOf(layout: Layout, editor: EditorState, viewport: Viewport): BoardOverlay['handles'] {
  const shown = new Set<string>();
  for (const ref of [editor.selection, editor.hover]) {
    if (ref === null || (ref.kind !== 'vertex' && ref.kind !== 'edge')) continue;
    const placed = findEdge(layout, ref.id);
    if (placed === null) continue;
    shown.add(placed.edge.id);
    if (ref.kind === 'edge') shown.add(placed.next.id);
  }
  return edgesOfLayout(layout)
    .filter(({ edge }) => shown.has(edge.id))
    .map(({ edge }) => ({
      key: edge.id,
      ...toScreen(viewport, edge.start),
      isPicked: editor.selection?.kind === 'vertex' && editor.selection.id === edge.id,
    }));
}

/** Where the field of a chosen thing stands, px: outside an edge, beside a hole, over a bend's middle. */
export function fieldPlace(layout: Layout, ref: EntityRef, viewport: Viewport): ScreenPoint | null {
  switch (ref.kind) {
    case 'edge': {
      const ends = measureEnds(layout, ref.id, viewport);
      return ends === null ? null : { xPx: (ends.a.xPx + ends.b.xPx) / 2, yPx: (ends.a.yPx + ends.b.yPx) / 2 };
    }
    case 'vertex': {
      const placed = findEdge(layout, ref.id);
      return placed === null ? null : toScreen(viewport, placed.edge.start);
    }
    case 'bend': {
      const bend = findBend(layout, ref.id);
      return bend === null ? null : toScreen(viewport, middle(bend.line.from, bend.line.to));
    }
    case 'hole':
    case 'slot': {
      const feature = findFeature(layout, ref.id);
      if (feature === null) return null;
      return toScreen(viewport, feature.kind === 'hole' ? feature.centre : middle(feature.from, feature.to));
    }
  }
}

/** How far a thing reaches along the rule, layout x in mm. */
export function extentAlongRule(
  layout: Layout,
  ref: EntityRef,
): { readonly fromMm: number; readonly toMm: number } | null {
  const span = (...points: readonly Point[]): { fromMm: number; toMm: number } => ({
    fromMm: Math.min(...points.map((point) => point.x)),
    toMm: Math.max(...points.map((point) => point.x)),
  });
  switch (ref.kind) {
    case 'edge': {
      const placed = findEdge(layout, ref.id);
      if (placed === null) return null;
      const { from, to } = measuredEnds(placed);
      return span(from, to, pointAt(placed.segment, 0.5));
    }
    case 'vertex': {
      const placed = findEdge(layout, ref.id);
      return placed === null ? null : span(placed.edge.start);
    }
    case 'bend': {
      const bend = findBend(layout, ref.id);
      return bend === null ? null : span(bend.line.from, bend.line.to);
    }
    case 'hole':
    case 'slot': {
      const feature = findFeature(layout, ref.id);
      if (feature === null) return null;
      const radius = (feature.kind === 'hole' ? (findHoleDiameterMm(feature.purpose) ?? 0) : feature.widthMm) / 2;
      const ends = feature.kind === 'hole' ? [feature.centre] : [feature.from, feature.to];
      const { fromMm, toMm } = span(...ends);
      return { fromMm: fromMm - radius, toMm: toMm + radius };
    }
  }
}

/** A rounded corner counts as the sharp one it replaces, as in the length that is typed. */
function measuredEnds({ loop, index, segment }: PlacedEdge): { readonly from: Point; readonly to: Point } {
  if (segment.kind === 'arc') return segment;
  return {
    from: roundedCorner(loop, index - 1) ?? segment.from,
    to: roundedCorner(loop, index + 1) ?? segment.to,
  };
}

function middle(a: Point, b: Point): Point {
  return { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
}

interface MeasureEnds {
  readonly from: ScreenPoint;
  readonly to: ScreenPoint;
  readonly a: ScreenPoint;
  readonly b: ScreenPoint;
  /** Outward on the screen, a unit vector. */
  readonly out: ScreenPoint;
}

function measureEnds(layout: Layout, edgeId: string, viewport: Viewport): MeasureEnds | null {
  const placed = findEdge(layout, edgeId);
  if (placed === null || distance(placed.segment.from, placed.segment.to) === 0) return null;
  const outward = turnRight(tangentAt(placed.segment, 0.5));
  const out = { xPx: outward.x, yPx: -outward.y };
  const measured = measuredEnds(placed);
  const from = toScreen(viewport, measured.from);
  const to = toScreen(viewport, measured.to);
  const shift = (point: ScreenPoint): ScreenPoint => ({
    xPx: point.xPx + out.xPx * MEASURE_OFFSET_PX,
    yPx: point.yPx + out.yPx * MEASURE_OFFSET_PX,
  });
  return { from, to, a: shift(from), b: shift(to), out };
}

/** Extension lines out from both ends and the line between them, on which the field stands. */
function measurePath(layout: Layout, edgeId: string, viewport: Viewport): string {
  const ends = measureEnds(layout, edgeId, viewport);
  if (ends === null) return '';
  const stroke = (point: ScreenPoint): string => {
    const at = (offset: number): string => `${point.xPx + ends.out.xPx * offset} ${point.yPx + ends.out.yPx * offset}`;
    return `M${at(MEASURE_PAST_PX)}L${at(MEASURE_OFFSET_PX + MEASURE_PAST_PX)}`;
  };
  return `${stroke(ends.from)}${stroke(ends.to)}M${ends.a.xPx} ${ends.a.yPx}L${ends.b.xPx} ${ends.b.yPx}`;
}
