/** A point of the drawing, mm. */
export interface DrawingPoint {
  readonly x: number;
  readonly y: number;
}

/** A piece of a contour, straight or an arc; `around` holds the points that carry its extents. */
interface Piece {
  readonly from: DrawingPoint;
  readonly to: DrawingPoint;
  readonly lengthMm: number;
  readonly around: readonly DrawingPoint[];
}

/** A closed or open run of pieces on one layer. */
export interface Contour {
  readonly layer: string;
  readonly isClosed: boolean;
  readonly lengthMm: number;
  readonly minX: number;
  readonly minY: number;
  readonly maxX: number;
  readonly maxY: number;
  /** Diameter when the contour is a full circle, else null. */
  readonly diameterMm: number | null;
}

/** What the shop reads out of a drawing file. */
export interface Drawing {
  readonly contours: readonly Contour[];
  /** Bend lines, straight, by layer. */
  readonly foldLines: readonly { readonly layer: string; readonly from: DrawingPoint; readonly to: DrawingPoint }[];
}

/** A file that can't be read as a DXF drawing. */
export class UnreadableDrawing extends Error {}

/** Ends closer than this count as joined: half of what a laser's kerf hides, mm. */
const JOINED_MM = 0.05;
const FOLD_LAYERS = ['FOLD-TOWARD', 'FOLD-AWAY'];
const IGNORED_LAYERS = ['SCRIBE', 'NOTES'];

type Pair = readonly [code: number, value: string];
interface Entity {
  readonly kind: string;
  readonly pairs: readonly Pair[];
}

/**
 * Read the ENTITIES of an ASCII DXF file: LINE, ARC, CIRCLE, LWPOLYLINE, POLYLINE. Other kinds (text, dimensions) are
 * not cut and are passed over.
 * @throws UnreadableDrawing when there is nothing of a DXF drawing in it
 */
export function readDrawing(text: string): Drawing {
  const entities = readEntities(text);
  const pieces = new Map<string, Piece[]>();
  const contours: Contour[] = [];
  const foldLines: { layer: string; from: DrawingPoint; to: DrawingPoint }[] = [];
  for (const entity of entities) {
    const layer = (valueOf(entity, 8) ?? '0').toUpperCase();
    if (IGNORED_LAYERS.includes(layer)) continue;
    const made = piecesOf(entity);
    if (made.length === 0) continue;
    if (FOLD_LAYERS.includes(layer)) {
      for (const piece of made) foldLines.push({ layer, from: piece.from, to: piece.to });
      continue;
    }
    if (entity.kind === 'CIRCLE') contours.push(contourOf(layer, made, 2 * numberOf(entity, 40)));
    else pieces.set(layer, [...(pieces.get(layer) ?? []), ...made]);
  }
  for (const [layer, loose] of pieces) for (const run of joinPieces(loose)) contours.push(contourOf(layer, run, null));
  return { contours, foldLines };
}

function readEntities(text: string): Entity[] {
  const lines = text.split(/\r\n|\r|\n/);
  const pairs: Pair[] = [];
  for (let at = 0; at + 1 < lines.length; at += 2) {
    const code = Number(lines[at]?.trim());
    if (!Number.isInteger(code)) throw new UnreadableDrawing(`Line ${at + 1} of the drawing is not a group code.`);
    pairs.push([code, (lines[at + 1] ?? '').trim()]);
  }
  const start = pairs.findIndex(([code, value]) => code === 2 && value === 'ENTITIES');
  if (start < 0) throw new UnreadableDrawing('The drawing has no ENTITIES section.');
  const entities: { kind: string; pairs: Pair[] }[] = [];
  for (const pair of pairs.slice(start + 1)) {
    if (pair[0] === 0 && pair[1] === 'ENDSEC') break;
    if (pair[0] === 0) entities.push({ kind: pair[1], pairs: [] });
    else entities.at(-1)?.pairs.push(pair);
  }
  return gatherVertices(entities);
}

/** The old kind of polyline spreads over several entities; its vertices are drawn into one. */
function gatherVertices(entities: readonly Entity[]): Entity[] {
  const gathered: { kind: string; pairs: Pair[] }[] = [];
  let open: { kind: string; pairs: Pair[] } | null = null;
  for (const entity of entities) {
    if (entity.kind === 'POLYLINE') {
      const kept = entity.pairs.filter(([code]) => code === 8 || code === 70);
      open = { kind: 'LWPOLYLINE', pairs: kept };
      gathered.push(open);
    } else if (entity.kind === 'VERTEX') {
      open?.pairs.push(...entity.pairs.filter(([code]) => code === 10 || code === 20 || code === 42));
    } else if (entity.kind === 'SEQEND') open = null;
    else gathered.push({ kind: entity.kind, pairs: [...entity.pairs] });
  }
  return gathered;
}

function valueOf(entity: Entity, code: number): string | undefined {
  return entity.pairs.find((pair) => pair[0] === code)?.[1];
}

function numberOf(entity: Entity, code: number): number {
  const value = Number(valueOf(entity, code));
  if (!Number.isFinite(value)) throw new UnreadableDrawing(`A ${entity.kind} lacks its value ${code}.`);
  return value;
}

function piecesOf(entity: Entity): Piece[] {
  if (entity.kind === 'LINE') {
    const from = { x: numberOf(entity, 10), y: numberOf(entity, 20) };
    return [straight(from, { x: numberOf(entity, 11), y: numberOf(entity, 21) })];
  }
  if (entity.kind === 'ARC' || entity.kind === 'CIRCLE') {
    const centre = { x: numberOf(entity, 10), y: numberOf(entity, 20) };
    const radius = numberOf(entity, 40);
    if (entity.kind === 'CIRCLE') return [arc(centre, radius, 0, 360)];
    const start = numberOf(entity, 50);
    const sweep = (((numberOf(entity, 51) - start) % 360) + 360) % 360 || 360;
    return [arc(centre, radius, start, sweep)];
  }
  return entity.kind === 'LWPOLYLINE' ? polylinePieces(entity) : [];
}

function polylinePieces(entity: Entity): Piece[] {
  const vertices: { x: number; y: number; bulge: number }[] = [];
  for (const [code, value] of entity.pairs) {
    const last = vertices.at(-1);
    if (code === 10) vertices.push({ x: Number(value), y: Number.NaN, bulge: 0 });
    else if (code === 20 && last) last.y = Number(value);
    else if (code === 42 && last) last.bulge = Number(value);
  }
  const isClosed = (Number(valueOf(entity, 70) ?? '0') & 1) === 1;
  const made: Piece[] = [];
  vertices.forEach((vertex, index) => {
    const next = vertices[index + 1] ?? (isClosed ? vertices[0] : undefined);
    if (next === undefined) return;
    if (!Number.isFinite(vertex.x + vertex.y)) throw new UnreadableDrawing('A polyline has a vertex without a place.');
    if (Math.hypot(next.x - vertex.x, next.y - vertex.y) < 1e-9) return;
    made.push(vertex.bulge === 0 ? straight(vertex, next) : bulged(vertex, next, vertex.bulge));
  });
  return made;
}

const degrees = (deg: number) => (deg * Math.PI) / 180;

function straight(from: DrawingPoint, to: DrawingPoint): Piece {
  return { from, to, lengthMm: Math.hypot(to.x - from.x, to.y - from.y), around: [from, to] };
}

function arc(centre: DrawingPoint, radius: number, startDeg: number, sweepDeg: number): Piece {
  const at = (deg: number) => ({
    x: centre.x + radius * Math.cos(degrees(deg)),
    y: centre.y + radius * Math.sin(degrees(deg)),
  });
  const around = [at(startDeg), at(startDeg + sweepDeg)];
  // The quadrant points within the sweep carry the extents.
  for (let quadrant = Math.ceil(startDeg / 90) * 90; quadrant < startDeg + sweepDeg; quadrant += 90)
    around.push(at(quadrant));
  return {
    from: at(startDeg),
    to: at(startDeg + sweepDeg),
    lengthMm: radius * degrees(sweepDeg),
    around,
  };
}

function bulged(from: DrawingPoint, to: DrawingPoint, bulge: number): Piece {
  const chord = Math.hypot(to.x - from.x, to.y - from.y);
  const included = 4 * Math.atan(bulge);
  const radius = chord / (2 * Math.sin(Math.abs(included) / 2));
  // Distance of the centre from the chord's middle, to the left of the run for a small positive bulge.
  const offset = (chord * (1 - bulge * bulge)) / (4 * bulge);
  const centre = {
    x: (from.x + to.x) / 2 - ((to.y - from.y) / chord) * offset,
    y: (from.y + to.y) / 2 + ((to.x - from.x) / chord) * offset,
  };
  const startPoint = bulge > 0 ? from : to;
  const startDeg = (Math.atan2(startPoint.y - centre.y, startPoint.x - centre.x) * 180) / Math.PI;
  const whole = arc(centre, radius, startDeg, (Math.abs(included) * 180) / Math.PI);
  return { ...whole, from, to };
}

const isNear = (a: DrawingPoint, b: DrawingPoint) => Math.hypot(a.x - b.x, a.y - b.y) <= JOINED_MM;

function joinPieces(loose: readonly Piece[]): Piece[][] {
  const left = [...loose];
  const runs: Piece[][] = [];
  for (let first = left.shift(); first !== undefined; first = left.shift()) {
    const run = [first];
    let end = first.to;
    while (!isNear(end, first.from)) {
      const index = left.findIndex((piece) => isNear(piece.from, end) || isNear(piece.to, end));
      const next = index < 0 ? undefined : left.splice(index, 1)[0];
      if (next === undefined) break;
      const isForward = isNear(next.from, end);
      run.push(isForward ? next : { ...next, from: next.to, to: next.from });
      end = isForward ? next.to : next.from;
    }
    runs.push(run);
  }
  return runs;
}

function contourOf(layer: string, run: readonly Piece[], diameterMm: number | null): Contour {
  const points = run.flatMap((piece) => piece.around);
  const xs = points.map((point) => point.x);
  const ys = points.map((point) => point.y);
  const first = run[0]?.from;
  const last = run.at(-1)?.to;
  return {
    layer,
    isClosed: first !== undefined && last !== undefined && isNear(first, last),
    lengthMm: run.reduce((sum, piece) => sum + piece.lengthMm, 0),
    minX: Math.min(...xs),
    minY: Math.min(...ys),
    maxX: Math.max(...xs),
    maxY: Math.max(...ys),
    diameterMm,
  };
}
