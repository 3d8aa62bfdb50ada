import { starterDocument } from '@foldwright/shared/part/starter-document';
import { developPart } from '@foldwright/shared/part/develop-part';
import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { TO_EYE, project } from './axonometry';
import { drawSolid } from './draw-solid';
import { type PaintFace, paintOrder } from './paint-order';

const flat = (heightMm: number, sizeMm = 10): PaintFace => ({
  kind: 'face',
  normal: { x: 0, y: 0, z: 1 },
  points: [
    { x: 0, y: 0, z: heightMm },
    { x: sizeMm, y: 0, z: heightMm },
    { x: sizeMm, y: sizeMm, z: heightMm },
    { x: 0, y: sizeMm, z: heightMm },
  ],
});

describe('paintOrder', () => {
  it('paints what lies lower first, in whatever order it came', () => {
    const [low, middle, high] = [flat(0), flat(5), flat(9)];
    for (const given of [
      [low, middle, high],
      [high, low, middle],
      [middle, high, low],
    ]) {
      expect(paintOrder(given)).toEqual([low, middle, high]);
    }
  });

  it('cuts a face that reaches through another and keeps all of its area', () => {
    const wall: PaintFace = {
      kind: 'face',
      normal: { x: 0, y: -1, z: 0 },
      points: [
        { x: 2, y: 5, z: -4 },
        { x: 8, y: 5, z: -4 },
        { x: 8, y: 5, z: 4 },
        { x: 2, y: 5, z: 4 },
      ],
    };
    const painted = paintOrder([flat(0, 40), wall]);
    expect(painted).toHaveLength(3);
    const heights = painted.map((item) => (item.kind === 'face' ? item.points.map((point) => point.z) : []));
    expect(Math.max(...(heights[0] ?? []))).toBe(0);
    expect(Math.min(...(heights[2] ?? []))).toBe(0);
  });

  it('paints a line in a face’s plane right after the face', () => {
    const line = { kind: 'line', from: { x: 0, y: 0, z: 5 }, to: { x: 10, y: 0, z: 5 } } as const;
    expect(paintOrder([line, flat(9), flat(5)])).toEqual([flat(5), line, flat(9)]);
  });
});

describe('drawSolid', () => {
  const formed = (starter: Parameters<typeof starterDocument>[0]) => {
    const result = developPart(starterDocument(starter), 'trial');
    if (!result.ok) throw new Error('the starter does not develop');
    return { development: result.development, mesh: poseFormed(layOutMesh(result.development, 0.3), 1) };
  };

  it('measures a formed bracket as its outside sizes project', () => {
    const { mesh, development } = formed({
      shape: 'l-bracket',
      baseMm: 60,
      flangeMm: 40,
      widthMm: 50,
      bendAngleDeg: 90,
    });
    const { min, max } = development.formedBox;
    const corners = [min.x, max.x].flatMap((x) =>
      [min.y, max.y].flatMap((y) => [min.z, max.z].map((z) => project({ x, y, z }))),
    );
    const drawing = drawSolid(mesh);
    // A box around the part is at least as large on the screen as the part.
    expect(drawing.widthPx).toBeLessThanOrEqual(
      Math.max(...corners.map((p) => p.x)) - Math.min(...corners.map((p) => p.x)) + 0.01,
    );
    expect(drawing.widthPx).toBeGreaterThan(60);
    expect(drawing.heightPx).toBeGreaterThan(40);
  });

  it('merges faces of one shade and stays small enough for a list', () => {
    const { mesh } = formed({
      shape: 'u-bracket',
      baseMm: 80,
      leftFlangeMm: 30,
      rightFlangeMm: 20,
      widthMm: 60,
      bendAngleDeg: 90,
    });
    const { pieces } = drawSolid(mesh);
    expect(pieces.some((piece) => piece.kind === 'lines')).toBe(true);
    expect(pieces.length).toBeLessThan(mesh.indices.length / 3);
  });

  it('looks from a direction of length one', () => {
    expect(Math.hypot(TO_EYE.x, TO_EYE.y, TO_EYE.z)).toBeCloseTo(1, 12);
  });
});
