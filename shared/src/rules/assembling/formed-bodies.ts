import type { Development } from '../../bending/development';
import type { Pose } from '../../bending/fold';
import { LYING_FLAT } from '../../bending/fold';
import { bodiesWhen, layOutPlates, posesWhen } from '../../brake/plates';
import type { PieceName } from '../../brake/plates';
import { posed, prism } from '../../brake/prism';
import type { Prism } from '../../brake/prism';
import type { Point3 } from '../../geometry/point';
import { along3, cross3, dot3, subtract3, unit3 } from '../../geometry/vector3';
import type { Neighbour } from '../../part/assembly';

/** A piece of the formed part: the convex prism around it, and those it consists of. */
export interface FormedBody {
  readonly of: PieceName;
  readonly around: Prism;
  readonly prisms: readonly Prism[];
}

/** The fully folded part. */
export interface FormedBodies {
  /** By panel. */
  readonly poses: readonly Pose[];
  readonly bodies: readonly FormedBody[];
}

/** Plates and bends of the formed part. Bends stand for their arcs by straight pieces, off by 0.9 % of their radius at most. */
export function formedBodies(development: Development): FormedBodies {
  const plates = layOutPlates(development);
  const poses = posesWhen(plates, () => true);
  const bodies = bodiesWhen(plates, poses, () => true).map(({ of, shape, around }): FormedBody => ({
    of,
    around,
    prisms: shape.pieces()?.map((piece) => posed(piece, around.pose)) ?? [around],
  }));
  return { poses, bodies };
}

/** Sides that a cylinder is given; it stands out by 0.05 % of its radius. */
const CYLINDER_SIDES = 96;

/** A neighbour as a prism around it. */
export function neighbourPrism(neighbour: Neighbour): Prism {
  if (neighbour.kind === 'box') {
    const { min, max } = neighbour;
    const corners = [
      { x: min.x, y: min.y },
      { x: max.x, y: min.y },
      { x: max.x, y: max.y },
      { x: min.x, y: max.y },
    ];
    return prism(LYING_FLAT, corners, min.z, max.z);
  }
  const along = subtract3(neighbour.to, neighbour.from);
  const uz = unit3(along);
  const aside = Math.abs(uz.x) < 0.8 ? { x: 1, y: 0, z: 0 } : { x: 0, y: 1, z: 0 };
  const ux = unit3(cross3(aside, uz));
  const radius = neighbour.radiusMm / Math.cos(Math.PI / CYLINDER_SIDES);
  const polygon = Array.from({ length: CYLINDER_SIDES }, (_, side) => {
    const turnRad = ((2 * side + 1) * Math.PI) / CYLINDER_SIDES;
    return { x: radius * Math.cos(turnRad), y: radius * Math.sin(turnRad) };
  });
  return prism({ origin: neighbour.from, ux, uy: cross3(uz, ux), uz }, polygon, 0, dot3(along, uz));
}

/** Corners of a prism in space. */
export function prismCorners({ pose, polygon, low, high }: Prism): readonly Point3[] {
  return polygon.flatMap(({ x, y }) => {
    const foot = along3(along3(pose.origin, pose.ux, x), pose.uy, y);
    return [along3(foot, pose.uz, low), along3(foot, pose.uz, high)];
  });
}

/** Directions its faces look in. */
export function faceDirections({ pose, polygon }: Prism): readonly Point3[] {
  return [pose.uz, ...edgeDirections(polygon, pose).map((edge) => unit3(cross3(edge, pose.uz)))];
}

/** Directions of the edges of its polygon. */
export function edgeDirections(polygon: Prism['polygon'], pose: Pose): readonly Point3[] {
  return polygon.flatMap((from, index) => {
    const to = polygon[(index + 1) % polygon.length];
    if (to === undefined) return [];
    const edge = along3(along3({ x: 0, y: 0, z: 0 }, pose.ux, to.x - from.x), pose.uy, to.y - from.y);
    return [unit3(edge)];
  });
}
