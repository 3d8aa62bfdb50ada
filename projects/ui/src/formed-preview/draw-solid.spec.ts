import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { project } from '@foldwright/shared/drawing/axonometry';
import { developPart } from '@foldwright/shared/part/develop-part';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { drawSolid } from './draw-solid';

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
});
