import { completeAnswers, hingeOf, openQuestions, traceAnswers } from './template-answers';

describe('what a person says about the template', () => {
  it('is complete only with all three answers', () => {
    expect(openQuestions({ showing: null, bearing: 'hidden', crease: null })).toBe(2);
    expect(completeAnswers({ showing: 'inside', bearing: 'hidden', crease: null })).toBeNull();
    expect(completeAnswers({ showing: 'inside', bearing: 'hidden', crease: 'crushed' })).not.toBeNull();
  });

  it.each([
    ['scored', 'inside', { kind: 'liner', face: 'A' }],
    ['scored', 'outside', { kind: 'liner', face: 'B' }],
    ['crushed', 'inside', { kind: 'middle' }],
    ['half-cut', 'inside', { kind: 'depth', depthMm: 0.75 }],
    ['half-cut', 'outside', { kind: 'depth', depthMm: 2.25 }],
  ] as const)(
    'puts the hinge of a crease %s with the %s showing on the inner side of the fold',
    (crease, showing, hinge) => {
      expect(hingeOf(crease, showing, 3)).toEqual(hinge);
    },
  );

  it('carries kind, thickness and bearing face into the document', () => {
    const answers = traceAnswers({ showing: 'inside', bearing: 'showing', crease: 'crushed' }, 'board', 2);
    expect(answers).toMatchObject({
      templateKind: 'board',
      thicknessMm: 2,
      bearing: 'showing',
      hinge: { kind: 'middle' },
    });
  });
});
