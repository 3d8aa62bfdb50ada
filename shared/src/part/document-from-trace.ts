import type { BendDirection, CardHinge, Feature, Layout, OutlineEdge, OutlineLoop } from '../bending/layout';
import type { Trace, TracePoint, TracePrimitive } from '../fitting/trace';
import { clockwise, counterClockwise, loopBounds } from '../geometry/loop';
import type { Loop, Segment } from '../geometry/path';
import type { Point } from '../geometry/point';
import { type RigidMotion, moveLoop, movePoint } from '../geometry/transform';
import { arcSweepDeg, bulgeOf, subSegment } from '../geometry/segment';
import { interiorPoint } from '../geometry/interior-point';
import type { PartDocument, TemplateKind } from './part-document';
import { rescaleLayout } from './rescale-layout';
import { emptyDocument } from './starter-document';

/** Makes a new id for a kind of thing; every call answers another one. */
export type IdSource = (prefix: 'loop' | 'edge' | 'hole' | 'slot') => string;

/** What a photo cannot tell and a person answers once per template. */
export interface TraceAnswers {
  readonly templateKind: TemplateKind;
  readonly thicknessMm: number;
  /** Which side of the formed part showed; decides what new bends are proposed as. Absent when nobody said. */
  readonly showing?: 'inside' | 'outside';
  /** Whether the face that showed bears on the machine, or the one that lay on the scale sheet. */
  readonly bearing: 'showing' | 'hidden';
  /** Where the creases turn; depths count from the face that showed. */
  readonly hinge: CardHinge;
  /** Calliper sizes overruling the photo's scale; 1 where the photo stands. */
  readonly calibration: { readonly scaleX: number; readonly scaleY: number };
}

/**
 * Direction that bends of this template get unless a person says otherwise. With the inside showing, flanges fold up
 * towards the viewer; with the outside showing they fold down, away. Nothing is mirrored for either: face A is the one
 * that showed.
 */
export function usualBendDirection(showing: 'inside' | 'outside'): BendDirection {
  return showing === 'inside' ? 'towards' : 'away';
}

/**
 * The part document of an accepted trace: outline, cut-outs, holes and slots in layout coordinates, squared up so that
 * the longest straight edge runs along an axis (however the template lay on the sheet), and moved so that the outline's
 * lower-left corner is the origin. Loops run as the kernel expects (outline counter-clockwise, cut-outs
 * clockwise); holes get the measured diameter as plain holes until a person matches them to fasteners. Lengths are those
 * of the template lying flat, so they mean its creases.
 * @param trace the reading of the photo
 * @param answers the facts about the template
 * @param nextId source of ids
 * @throws RangeError when the trace has no outline
 */
export function documentFromTrace(trace: Trace, answers: TraceAnswers, nextId: IdSource): PartDocument {
  const traced = counterClockwise(segmentsOf(trace.outer));
  const square: RigidMotion = { turnDeg: squaringTurnDeg(traced), shift: { x: 0, y: 0 } };
  const outer = moveLoop(square, traced);
  const bounds = loopBounds(outer);
  if (bounds === null || outer.length < 2) throw new RangeError('the trace has no outline');
  const shift = (point: Point): Point => ({ x: point.x - bounds.min.x, y: point.y - bounds.min.y });
  const settle = (point: TracePoint): Point => shift(movePoint(square, pointOf(point)));
  const cutouts = trace.cutouts
    .map((primitives) => moveLoop(square, clockwise(segmentsOf(primitives))))
    .filter((loop) => loop.length > 1);
  const features: readonly Feature[] = [
    ...trace.holes.map(({ centre, diameterMm }): Feature => ({
      kind: 'hole',
      id: nextId('hole'),
      centre: settle(centre),
      purpose: { kind: 'plain', diameterMm },
    })),
    ...trace.slots.map(({ from, to, widthMm }): Feature => ({
      kind: 'slot',
      id: nextId('slot'),
      from: settle(from),
      to: settle(to),
      widthMm,
    })),
  ];
  const layout: Layout = {
    outer: outlineLoop(outer, shift, nextId),
    cutouts: cutouts.map((loop) => outlineLoop(loop, shift, nextId)),
    features,
    bends: [],
    reliefs: { mode: 'automatic', widthMm: null, depthMm: null, shape: 'obround' },
    baseAnchor: shift(interiorPoint(outer, cutouts) ?? bounds.min),
  };
  const { scaleX, scaleY } = answers.calibration;
  return {
    ...emptyDocument(rescaleLayout(layout, { x: scaleX, y: scaleY })),
    template: {
      kind: answers.templateKind,
      thicknessMm: answers.thicknessMm,
      reading: {
        readOn: 'crease',
        bearingFace: answers.bearing === 'showing' ? 'A' : 'B',
        hinge: answers.hinge,
      },
      ...(answers.showing === undefined ? {} : { flangesFold: usualBendDirection(answers.showing) }),
    },
    calibration: { scaleX, scaleY },
  };
}

/** The smallest turn, -45 to 45 degrees, that lays the longest straight edge along an axis; 0 without a straight edge. */
function squaringTurnDeg(outer: Loop): number {
  const runs = outer.flatMap((segment) =>
    segment.kind === 'line' ? [{ x: segment.to.x - segment.from.x, y: segment.to.y - segment.from.y }] : [],
  );
  const longest = runs.reduce((a, b) => (Math.hypot(b.x, b.y) > Math.hypot(a.x, a.y) ? b : a), { x: 0, y: 0 });
  const angleDeg = (Math.atan2(longest.y, longest.x) * 180) / Math.PI;
  return Math.round(angleDeg / 90) * 90 - angleDeg;
}

function pointOf([x, y]: TracePoint): Point {
  return { x, y };
}

function segmentsOf(primitives: readonly TracePrimitive[]): Loop {
  return primitives.flatMap((primitive): readonly Segment[] => {
    const from = pointOf(primitive.from);
    const to = pointOf(primitive.to);
    if (primitive.kind === 'line') return [{ kind: 'line', from, to }];
    const arc: Segment = { kind: 'arc', from, to, centre: pointOf(primitive.centre), clockwise: primitive.clockwise };
    // A bulge cannot say a whole circle, nor nearly one with any accuracy; two halves can.
    return Math.abs(arcSweepDeg(arc)) > LARGEST_SWEEP_DEG ? [subSegment(arc, 0, 0.5), subSegment(arc, 0.5, 1)] : [arc];
  });
}

/** Arcs beyond this sweep are stored as two halves, degrees. */
const LARGEST_SWEEP_DEG = 300;

function outlineLoop(loop: Loop, shift: (point: Point) => Point, nextId: IdSource): OutlineLoop {
  const id = nextId('loop');
  return {
    id,
    edges: loop.map((segment): OutlineEdge => ({
      id: nextId('edge'),
      start: shift(segment.from),
      bulge: bulgeOf(segment),
    })),
  };
}
