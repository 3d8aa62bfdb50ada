import type { Point, Point3 } from '@foldwright/shared/geometry/point';
import type { Segment } from '@foldwright/shared/geometry/path';
import type { CylindricalBend, PlannedEdge, PlannedLoops, Slab, SolidPlan } from '@foldwright/shared/solid/solid-plan';
import type {
  Geom2d_Curve,
  Geom_CylindricalSurface,
  TopoDS_Edge,
  TopoDS_Face,
  TopoDS_Shape,
  TopoDS_Solid,
  TopoDS_Wire,
} from 'replicad-opencascadejs';
import type { OpenCascade } from './open-cascade';

/** Why a plan could not be made into a solid. */
export class SolidBuildError extends Error {}

/** Faces this near to each other are sewn, mm. */
const SEWING_MM = 1e-5;
/** How near an oblique side's curve keeps to its helix, mm, and how finely it may be cut for that. */
const HELIX_MM = 1e-9;
const HELIX_DEGREE = 14;
const HELIX_PIECES = 400;

/**
 * The formed part as one closed solid: plane faces of lines and arcs, bends as faces of true cylinders, their oblique sides ruled between
 * two helices.
 * @throws SolidBuildError when the faces do not close, or make no valid solid
 */
export function buildSolid(oc: OpenCascade, plan: SolidPlan): TopoDS_Solid {
  const sewing = new oc.BRepBuilderAPI_Sewing(SEWING_MM, true, true, true, false);
  for (const piece of plan.pieces) {
    const faces =
      piece.kind === 'slab' ? facesOfSlab(oc, piece, plan.thicknessMm) : facesOfBend(oc, piece, plan.thicknessMm);
    for (const face of faces) sewing.Add(face);
  }
  sewing.Perform();
  if (sewing.NbFreeEdges() > 0) throw new SolidBuildError(`${sewing.NbFreeEdges()} edges of the solid stay open.`);
  const shape = sewing.SewedShape();
  if (shape.ShapeType() !== oc.TopAbs_ShapeEnum.TopAbs_SHELL) {
    throw new SolidBuildError('The faces make more than one shell.');
  }
  const solid = new oc.BRepBuilderAPI_MakeSolid(oc.TopoDS.Shell(shape)).Solid();
  oc.BRepLib.OrientClosedSolid(solid);
  if (!new oc.BRepCheck_Analyzer(solid, true, false, false).IsValid()) {
    throw new SolidBuildError('The solid is not valid.');
  }
  return solid;
}

const gp = (oc: OpenCascade, { x, y, z }: Point3) => new oc.gp_Pnt(x, y, z);
const dir = (oc: OpenCascade, { x, y, z }: Point3) => new oc.gp_Dir(x, y, z);

function wireOf(oc: OpenCascade, edges: readonly TopoDS_Edge[]): TopoDS_Wire {
  const wire = new oc.BRepBuilderAPI_MakeWire();
  for (const edge of edges) wire.Add(edge);
  if (!wire.IsDone()) throw new SolidBuildError('A boundary does not close.');
  return wire.Wire();
}

function planeFace(oc: OpenCascade, edges: readonly TopoDS_Edge[]): TopoDS_Face {
  const face = new oc.BRepBuilderAPI_MakeFace(wireOf(oc, edges), true);
  if (!face.IsDone()) throw new SolidBuildError('A side is not plane.');
  return face.Face();
}

const straight = (oc: OpenCascade, from: Point3, to: Point3): TopoDS_Edge =>
  new oc.BRepBuilderAPI_MakeEdge(gp(oc, from), gp(oc, to)).Edge();

/* plates */

function facesOfSlab(oc: OpenCascade, slab: Slab, thicknessMm: number): readonly TopoDS_Shape[] {
  const { pose, loops } = slab;
  const at = ({ x, y }: Point, height: number): Point3 => ({
    x: pose.origin.x + pose.ux.x * x + pose.uy.x * y + pose.uz.x * height,
    y: pose.origin.y + pose.ux.y * x + pose.uy.y * y + pose.uz.y * height,
    z: pose.origin.z + pose.ux.z * x + pose.uy.z * y + pose.uz.z * height,
  });
  const edge = (segment: Segment, height: number): TopoDS_Edge => {
    if (segment.kind === 'line') return straight(oc, at(segment.from, height), at(segment.to, height));
    const { centre, from, to, clockwise } = segment;
    const out = { x: from.x - centre.x, y: from.y - centre.y };
    const radius = Math.hypot(out.x, out.y);
    const side = clockwise ? -1 : 1;
    const axis = { x: pose.uz.x * side, y: pose.uz.y * side, z: pose.uz.z * side };
    const first = {
      x: (pose.ux.x * out.x + pose.uy.x * out.y) / radius,
      y: (pose.ux.y * out.x + pose.uy.y * out.y) / radius,
      z: (pose.ux.z * out.x + pose.uy.z * out.y) / radius,
    };
    const circle = new oc.gp_Circ(new oc.gp_Ax2(gp(oc, at(centre, height)), dir(oc, axis), dir(oc, first)), radius);
    return new oc.BRepBuilderAPI_MakeEdge(circle, 0, sweepOf({ centre, from, to, clockwise })).Edge();
  };
  const face = (height: number): TopoDS_Face => {
    const plane = new oc.gp_Pln(gp(oc, at({ x: 0, y: 0 }, height)), dir(oc, pose.uz));
    return boundedFace(
      loops,
      (edges) => new oc.BRepBuilderAPI_MakeFace(plane, edges, true),
      (own) =>
        wireOf(
          oc,
          own.map(({ segment }) => edge(segment, height)),
        ),
    );
  };
  const up = new oc.gp_Vec(pose.uz.x * thicknessMm, pose.uz.y * thicknessMm, pose.uz.z * thicknessMm);
  const sides = freeEdges(loops).map((segment) => new oc.BRepPrimAPI_MakePrism(edge(segment, 0), up).Shape());
  return [face(0), face(thicknessMm), ...sides];
}

const freeEdges = (loops: PlannedLoops): readonly Segment[] =>
  loops.flatMap((loop) => loop.flatMap(({ segment, isSeam }) => (isSeam ? [] : [segment])));

interface FaceMaker {
  Add(wire: TopoDS_Wire): void;
  IsDone(): boolean;
  Face(): TopoDS_Face;
}

function boundedFace(
  loops: PlannedLoops,
  start: (outer: TopoDS_Wire) => FaceMaker,
  wire: (loop: readonly PlannedEdge[]) => TopoDS_Wire,
  asOpening: (wire: TopoDS_Wire) => TopoDS_Wire = (opening) => opening,
): TopoDS_Face {
  const [outer, ...openings] = loops;
  if (outer === undefined) throw new SolidBuildError('A piece has no boundary.');
  const face = start(wire(outer));
  for (const opening of openings) face.Add(asOpening(wire(opening)));
  if (!face.IsDone()) throw new SolidBuildError('A face does not close.');
  return face.Face();
}

/** How far an arc turns, radians; equal ends are a full circle. */
function sweepOf({ centre, from, to, clockwise }: Omit<Extract<Segment, { kind: 'arc' }>, 'kind'>): number {
  if (from.x === to.x && from.y === to.y) return 2 * Math.PI;
  const start = Math.atan2(from.y - centre.y, from.x - centre.x);
  const end = Math.atan2(to.y - centre.y, to.x - centre.x);
  const turn = (clockwise ? start - end : end - start) % (2 * Math.PI);
  return turn > 0 ? turn : turn + 2 * Math.PI;
}

/* bends */

function facesOfBend(oc: OpenCascade, bend: CylindricalBend, thicknessMm: number): readonly TopoDS_Shape[] {
  if (!(bend.insideRadiusMm > 0)) throw new SolidBuildError('A bend without an inside radius has no inside face.');
  const radii = { inside: bend.insideRadiusMm, outside: bend.insideRadiusMm + thicknessMm };
  const surface = (radiusMm: number): Geom_CylindricalSurface =>
    new oc.Geom_CylindricalSurface(
      new oc.gp_Ax3(gp(oc, bend.centre), dir(oc, bend.axis), dir(oc, bend.start)),
      radiusMm,
    );
  const inside = surface(radii.inside);
  const outside = surface(radii.outside);
  const wire = (on: Geom_CylindricalSurface, loop: readonly PlannedEdge[]): TopoDS_Wire =>
    wireOf(
      oc,
      loop.map(({ segment }) => edgeOn(oc, on, segment, bend.radPerMm)),
    );
  const face = (on: Geom_CylindricalSurface): TopoDS_Face =>
    boundedFace(
      bend.loops,
      (outer) => new oc.BRepBuilderAPI_MakeFace(on, outer, true),
      (loop) => wire(on, loop),
      // Angle and height are swapped against the unrolled zone, so that every boundary runs the other way. The maker turns
      // the outer one round by itself.
      (opening) => oc.TopoDS.Wire(opening.Reversed()),
    );
  const sides = freeEdges(bend.loops).map((segment) => sideOf(oc, bend, radii, inside, outside, segment));
  return [face(inside), face(outside), ...sides];
}

/** An edge of the unrolled zone laid on a cylinder: first the curve in the cylinder's own coordinates, then in space. */
function edgeOn(oc: OpenCascade, surface: Geom_CylindricalSurface, segment: Segment, radPerMm: number): TopoDS_Edge {
  const { curve, first, last } = curveOn(oc, segment, radPerMm);
  const edge = new oc.BRepBuilderAPI_MakeEdge(curve, surface, first, last).Edge();
  oc.BRepLib.BuildCurve3d(edge, HELIX_MM, oc.GeomAbs_Shape.GeomAbs_C2, HELIX_DEGREE, HELIX_PIECES);
  return edge;
}

/** A straight edge becomes a line in angle and height, an arc an ellipse. */
function curveOn(
  oc: OpenCascade,
  segment: Segment,
  radPerMm: number,
): { readonly curve: Geom2d_Curve; readonly first: number; readonly last: number } {
  const point = ({ x, y }: Point) => new oc.gp_Pnt2d(y * radPerMm, x);
  if (segment.kind === 'line') {
    const { from, to } = segment;
    const [du, dv] = [(to.y - from.y) * radPerMm, to.x - from.x];
    return { curve: new oc.Geom2d_Line(point(from), new oc.gp_Dir2d(du, dv)), first: 0, last: Math.hypot(du, dv) };
  }
  const { centre, from, clockwise } = segment;
  const radius = Math.hypot(from.x - centre.x, from.y - centre.y);
  const across = radius * radPerMm;
  // The ellipse's long axis comes first: along the height where that is longer than the angle. Angle and height are swapped
  // against the unrolled zone's x and y, which turns its sense round.
  const isTall = radius >= across;
  // The parameter runs with the arc: from the long axis to the short one where that is the arc's way, else the other way round.
  const isDirect = isTall !== clockwise;
  const ellipse = new oc.gp_Elips2d(
    new oc.gp_Ax2d(point(centre), isTall ? new oc.gp_Dir2d(0, 1) : new oc.gp_Dir2d(1, 0)),
    Math.max(radius, across),
    Math.min(radius, across),
    !isDirect,
  );
  const [height, angle] = [(from.x - centre.x) / radius, (from.y - centre.y) / radius];
  const start = isTall ? Math.atan2(angle, height) : Math.atan2(height, angle);
  const first = isDirect ? start : -start;
  return { curve: new oc.Geom2d_Ellipse(ellipse), first, last: first + sweepOf(segment) };
}

function sideOf(
  oc: OpenCascade,
  bend: CylindricalBend,
  radii: { readonly inside: number; readonly outside: number },
  inside: Geom_CylindricalSurface,
  outside: Geom_CylindricalSurface,
  segment: Segment,
): TopoDS_Shape {
  const at = ({ x, y }: Point, radiusMm: number): Point3 => {
    const [cosine, sine] = [Math.cos(y * bend.radPerMm) * radiusMm, Math.sin(y * bend.radPerMm) * radiusMm];
    const { centre, axis, start, turned } = bend;
    return {
      x: centre.x + axis.x * x + start.x * cosine + turned.x * sine,
      y: centre.y + axis.y * x + start.y * cosine + turned.y * sine,
      z: centre.z + axis.z * x + start.z * cosine + turned.z * sine,
    };
  };
  const { from, to } = segment;
  const isPlane = segment.kind === 'line' && (isLevel(from.x, to.x) || isLevel(from.y, to.y));
  const edges = [edgeOn(oc, inside, segment, bend.radPerMm), edgeOn(oc, outside, segment, bend.radPerMm)] as const;
  if (isPlane) {
    return planeFace(oc, [
      edges[0],
      straight(oc, at(to, radii.inside), at(to, radii.outside)),
      edges[1],
      straight(oc, at(from, radii.outside), at(from, radii.inside)),
    ]);
  }
  const ruled = new oc.BRepOffsetAPI_ThruSections(false, true, SEWING_MM);
  ruled.CheckCompatibility(false);
  for (const edge of edges) ruled.AddWire(wireOf(oc, [edge]));
  ruled.Build();
  return ruled.Shape();
}

const LEVEL_MM = 1e-9;
const isLevel = (a: number, b: number): boolean => Math.abs(a - b) <= LEVEL_MM;
