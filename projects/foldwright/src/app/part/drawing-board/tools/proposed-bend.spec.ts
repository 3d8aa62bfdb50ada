import type { Template } from '@foldwright/shared/part/part-document';
import { proposedBend } from './proposed-bend';

const TEMPLATE: Template = {
  kind: 'single-wall',
  thicknessMm: 3,
  reading: { readOn: 'crease', bearingFace: 'B', hinge: { kind: 'middle' } },
  flangesFold: 'away',
};

describe('the bend that is proposed', () => {
  it('follows the template: its flanges’ way, and lengths as it was measured', () => {
    expect(proposedBend(TEMPLATE)).toMatchObject({ direction: 'away', lengths: { from: 'template', override: null } });
  });

  it('reaches to the outside apex, towards, when sizes were typed', () => {
    expect(proposedBend(null)).toMatchObject({
      direction: 'towards',
      lengths: { from: 'reference', reference: 'outsideApex' },
    });
  });
});
