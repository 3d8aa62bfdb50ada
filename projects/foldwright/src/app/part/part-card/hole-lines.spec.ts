import type { Feature } from '@foldwright/shared/bending/layout';
import { holeLines } from './hole-lines';

const hole = (thread: string): Feature => ({
  kind: 'hole',
  id: thread + Math.abs(thread.length),
  centre: { x: 0, y: 0 },
  purpose: { kind: 'clearance', thread, fit: 'medium' },
});

describe('holeLines', () => {
  it('tells each kind in one line with its sizes counted', () => {
    const slot: Feature = { kind: 'slot', id: 's', from: { x: 0, y: 0 }, to: { x: 10, y: 0 }, widthMm: 6.6 };
    const plain: Feature = {
      kind: 'hole',
      id: 'p',
      centre: { x: 0, y: 0 },
      purpose: { kind: 'plain', diameterMm: 52 },
    };
    expect(holeLines([hole('M5'), hole('M5'), hole('M6'), plain, slot]).map(({ text }) => text)).toEqual([
      '2 × M5 and M6 clearance',
      'Ø 52 plain',
      '6.6 × 16.6 slot',
    ]);
  });
});
