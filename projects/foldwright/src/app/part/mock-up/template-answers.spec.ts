import { answersOf, completeAnswers, hingeOf, openQuestions, traceAnswers } from './template-answers';

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

  it.each([
    { showing: 'inside', bearing: 'showing', crease: 'scored' },
    { showing: 'outside', bearing: 'hidden', crease: 'half-cut' },
    { showing: 'outside', bearing: 'showing', crease: 'crushed' },
  ] as const)('reads $showing, $bearing, $crease back from the document', (given) => {
    const { bearing, hinge } = traceAnswers(given, 'single-wall', 3);
    const template = {
      kind: 'single-wall',
      thicknessMm: 3,
      reading: { readOn: 'crease', bearingFace: bearing === 'showing' ? 'A' : 'B', hinge },
      flangesFold: given.showing === 'inside' ? 'towards' : 'away',
    } as const;
    expect(answersOf(template)).toEqual(given);
  });

  it('leaves open what a document does not tell', () => {
    expect(openQuestions(answersOf(null))).toBe(3);
  });
});
