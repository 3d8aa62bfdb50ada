import type { Loop, Segment } from '@foldwright/shared/geometry/path';
import type { Point } from '@foldwright/shared/geometry/point';
import { arcRadius, arcSweepDeg, pointAt } from '@foldwright/shared/geometry/segment';
import { along, distance, subtract, turnLeft, unit } from '@foldwright/shared/geometry/vector';

// Four decimals of a millimetre: a tenth of a micron, far under any screen.
const figure = (value: number): string => String(Math.round(value * 1e4) / 1e4);
const pair = (point: Point): string => `${figure(point.x)} ${figure(point.y)}`;

/**
 * Path data of a closed chain in layout coordinates (mm, y up); the drawing's transform turns y over.
 * With y up, SVG's positive direction of turn is counter-clockwise.
 */
export function loopPath(loop: Loop): string {
  const first = loop[0];
  if (first === undefined) return '';
  return `M${pair(first.from)}${loop.map(segmentPath).join('')}Z`;
}

/** Path data of one segment with its own starting point. */
export function openPath(segment: Segment): string {
  return `M${pair(segment.from)}${segmentPath(segment)}`;
}

/** Path data of a circle, run clockwise so that it cuts a hole whatever the fill rule. */
export function circlePath(centre: Point, diameterMm: number): string {
  const radius = diameterMm / 2;
  const left = { x: centre.x - radius, y: centre.y };
  const right = { x: centre.x + radius, y: centre.y };
  const arc = `A${figure(radius)} ${figure(radius)} 0 0 0 `;
  return `M${pair(left)}${arc}${pair(right)}${arc}${pair(left)}Z`;
}

/** Path data of an obround: a slot between the centres of its two end radii. */
export function obroundPath(from: Point, to: Point, widthMm: number): string {
  if (distance(from, to) === 0) return circlePath(from, widthMm);
  const side = turnLeft(unit(subtract(to, from)));
  const radius = widthMm / 2;
  const arc = `A${figure(radius)} ${figure(radius)} 0 0 0 `;
  const fromLeft = along(from, side, radius);
  const toLeft = along(to, side, radius);
  return `M${pair(fromLeft)}L${pair(toLeft)}${arc}${pair(along(to, side, -radius))}L${pair(along(from, side, -radius))}${arc}${pair(fromLeft)}Z`;
}

function segmentPath(segment: Segment): string {
  if (segment.kind === 'line') return `L${pair(segment.to)}`;
  const radius = figure(arcRadius(segment));
  const sweepDeg = arcSweepDeg(segment);
  const turn = segment.clockwise ? 0 : 1;
  if (Math.abs(sweepDeg) >= 359.9) {
    const half = pointAt(segment, 0.5);
    return `A${radius} ${radius} 0 0 ${turn} ${pair(half)}A${radius} ${radius} 0 0 ${turn} ${pair(segment.to)}`;
  }
  return `A${radius} ${radius} 0 ${Math.abs(sweepDeg) > 180 ? 1 : 0} ${turn} ${pair(segment.to)}`;
}
