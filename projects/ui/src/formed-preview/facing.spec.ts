import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { developPart } from '@foldwright/shared/part/develop-part';
import { starterDocument } from '@foldwright/shared/part/starter-document';
import { bestFacing, turned } from './facing';

describe('bestFacing', () => {
  const meshOf = (starter: Parameters<typeof starterDocument>[0]) => {
    const result = developPart(starterDocument(starter), 'trial');
    if (!result.ok) throw new Error('the starter does not develop');
    return poseFormed(layOutMesh(result.development, 0.3), 1);
  };

  it('puts the flange of an L behind its base, where both are seen', () => {
    const mesh = meshOf({ shape: 'l-bracket', baseMm: 46, flangeMm: 52, widthMm: 60, bendAngleDeg: 90 });
    // As laid out, the flange stands at the far end of x, which the view has to the right and in front.
    expect([1, 2]).toContain(bestFacing(mesh));
  });

  it('leaves a plate as it was drawn', () => {
    expect(bestFacing(meshOf({ shape: 'flat-plate', widthMm: 80, heightMm: 80 }))).toBe(0);
  });

  it('turns without changing any length', () => {
    const mesh = meshOf({ shape: 'l-bracket', baseMm: 40, flangeMm: 20, widthMm: 30, bendAngleDeg: 90 });
    const back = turned(turned(mesh, 1), 3);
    mesh.positions.forEach((value, index) => expect(back.positions[index]).toBeCloseTo(value, 9));
  });
});
