import { developLayout } from './develop';
import type { DevelopmentProblem } from './development';
import type { Layout } from './layout';
import { sampleBend, sampleLayout, sampleLoop, sampleStock } from './testing/sample-layouts';

function problemsOf(layout: Layout, stock = sampleStock()): readonly DevelopmentProblem[] {
  const result = developLayout(layout, null, stock);
  return result.ok ? [] : result.problems;
}

describe('problems name the offenders', () => {
  const square = [
    { x: 0, y: 0 },
    { x: 100, y: 0 },
    { x: 100, y: 60 },
    { x: 0, y: 60 },
  ];
  const plate = (bends: Layout['bends'], changes: Partial<Layout> = {}): Layout => ({
    ...sampleLayout({ outer: square, bends, baseAnchor: { x: 5, y: 5 } }),
    ...changes,
  });
  const across = (id: string, x: number): Layout['bends'][number] => sampleBend(id, { x, y: -1 }, { x, y: 61 });

  it('an outline that crosses itself', () => {
    const outer = sampleLoop(
      'outer',
      [square[0], square[2], square[1], square[3]].flatMap((point) => point ?? []),
    );
    expect(problemsOf(plate([], { outer }))).toMatchObject([
      { code: 'outlineNotSimple', ids: expect.arrayContaining(['outer']) as unknown },
    ]);
  });

  it('an outline of nothing', () => {
    expect(problemsOf(plate([], { outer: sampleLoop('outer', square.slice(0, 2)) }))[0]).toMatchObject({
      code: 'outlineNotSimple',
      ids: ['outer'],
    });
    const lost = { id: 'outer', edges: [{ id: 'e', start: { x: Number.NaN, y: 0 }, bulge: 0 }] };
    expect(problemsOf(plate([], { outer: lost }))[0]).toMatchObject({ code: 'outlineNotSimple' });
  });

  it('openings over an edge, outside, or in one another', () => {
    const hole = (id: string, x: number, diameterMm = 6): Layout['features'][number] => ({
      kind: 'hole',
      id,
      centre: { x, y: 30 },
      purpose: { kind: 'plain', diameterMm },
    });
    expect(problemsOf(plate([], { features: [hole('edge', 1)] }))).toMatchObject([
      { code: 'outlineNotSimple', ids: expect.arrayContaining(['edge', 'outer']) as unknown },
    ]);
    expect(problemsOf(plate([], { features: [hole('off', 200)] }))).toMatchObject([
      { code: 'outlineNotSimple', ids: ['off'] },
    ]);
    expect(problemsOf(plate([], { features: [hole('big', 50, 20), hole('small', 50)] }))[0]).toMatchObject({
      ids: expect.arrayContaining(['small', 'big']) as unknown,
    });
  });

  it('a hole of no known size', () => {
    const features: Layout['features'] = [
      { kind: 'hole', id: 'odd', centre: { x: 50, y: 30 }, purpose: { kind: 'tapped', thread: 'M6.5' } },
    ];
    expect(problemsOf(plate([], { features }))).toMatchObject([{ code: 'holeUnknown', ids: ['odd'] }]);
  });

  it('a bend line beside the sheet', () => {
    expect(problemsOf(plate([across('b', 130)]))).toMatchObject([{ code: 'bendLineOutside', ids: ['b'] }]);
    expect(problemsOf(plate([sampleBend('b', { x: 1, y: 1 }, { x: 1, y: 1 })]))).toMatchObject([
      { code: 'bendLineOutside' },
    ]);
  });

  it('a bend line that ends inside', () => {
    expect(problemsOf(plate([sampleBend('b', { x: 50, y: -1 }, { x: 50, y: 40 })]))).toMatchObject([
      { code: 'bendLineEndsInside', ids: ['b'] },
    ]);
    expect(problemsOf(plate([sampleBend('b', { x: 50, y: 20 }, { x: 50, y: 40 })]))).toMatchObject([
      { code: 'bendLineEndsInside', ids: ['b'] },
    ]);
  });

  it('a bend line that stops at an opening and so parts nothing', () => {
    const cutouts = [
      sampleLoop('window', [
        { x: 40, y: 20 },
        { x: 60, y: 20 },
        { x: 60, y: 40 },
        { x: 40, y: 40 },
      ]),
    ];
    expect(problemsOf(plate([sampleBend('b', { x: 50, y: -1 }, { x: 50, y: 20 })], { cutouts }))).toMatchObject([
      { code: 'bendLineEndsInside', ids: ['b'] },
    ]);
  });

  it('bend lines that cross', () => {
    const along = sampleBend('along', { x: -1, y: 30 }, { x: 101, y: 30 });
    expect(problemsOf(plate([across('across', 50), along]))).toMatchObject([
      { code: 'bendLinesCross', ids: ['across', 'along'] },
    ]);
  });

  it('a ring of panels', () => {
    const cutouts = [
      sampleLoop('window', [
        { x: 30, y: 20 },
        { x: 70, y: 20 },
        { x: 70, y: 40 },
        { x: 30, y: 40 },
      ]),
    ];
    const bends = [
      sampleBend('south', { x: 50, y: -1 }, { x: 50, y: 20 }),
      sampleBend('north', { x: 45, y: 40 }, { x: 45, y: 61 }),
    ];
    const [problem] = problemsOf(plate(bends, { cutouts }));
    expect(problem).toMatchObject({ code: 'panelRing' });
    expect([...(problem?.ids ?? [])].sort()).toEqual(['north', 'south']);
  });

  it('bends too close to leave a flat between them, and just far enough', () => {
    // Inside apex at 90 degrees, R 2: each bend takes 2 mm.
    expect(problemsOf(plate([across('a', 50), across('b', 53.99)]))).toMatchObject([
      { code: 'bendTooClose', ids: expect.arrayContaining(['a', 'b']) as unknown },
    ]);
    expect(problemsOf(plate([across('a', 50), across('b', 54.01)]))).toEqual([]);
  });

  it('a flange shorter than its own bend', () => {
    expect(problemsOf(plate([across('a', 98.5)]))).toMatchObject([{ code: 'bendTooClose', ids: ['a'] }]);
  });

  it.each([0, 1e-9, 0.099, -90, 180.5, Number.NaN])('an angle of %s', (bendAngleDeg) => {
    expect(problemsOf(plate([{ ...across('a', 50), bendAngleDeg }]))).toMatchObject([
      { code: 'angleOutOfRange', ids: ['a'] },
    ]);
  });

  it.each([-1, Number.NaN, Infinity])('a radius of %s', (insideRadiusMm) => {
    expect(problemsOf(plate([{ ...across('a', 50), insideRadiusMm }]))).toMatchObject([
      { code: 'radiusOutOfRange', ids: ['a'] },
    ]);
  });

  it('an apex at 180 degrees, but not a tangent there', () => {
    const hem = { ...across('a', 50), bendAngleDeg: 180 };
    expect(problemsOf(plate([hem]))).toMatchObject([{ code: 'referenceNotAllowed', ids: ['a'] }]);
    expect(problemsOf(plate([{ ...hem, lengths: { from: 'reference', reference: 'tangent' } }]))).toEqual([]);
  });

  it('template lengths without a template, and above 165 degrees', () => {
    const bend = { ...across('a', 50), lengths: { from: 'template', override: null } as const };
    expect(problemsOf(plate([bend]))).toMatchObject([{ code: 'referenceNotAllowed', ids: ['a'] }]);
    const template = {
      thicknessMm: 2,
      reading: { readOn: 'faceA', bearingFace: 'A', hinge: { kind: 'middle' } },
    } as const;
    const steep = developLayout(plate([{ ...bend, bendAngleDeg: 166 }]), template, sampleStock());
    expect(steep).toMatchObject({ ok: false, problems: [{ code: 'referenceNotAllowed', ids: ['a'] }] });
  });

  it('a K no sheet can have', () => {
    const override = { kind: 'kFactor', kFactor: 0.6, reason: 'x' } as const;
    expect(problemsOf(plate([{ ...across('a', 50), override }]))).toMatchObject([{ code: 'kOutOfRange', ids: ['a'] }]);
  });

  it('an anchor off the sheet', () => {
    expect(problemsOf(plate([across('a', 50)], { baseAnchor: { x: 200, y: 0 } }))).toMatchObject([
      { code: 'baseAnchorOutside' },
    ]);
  });

  it('a sheet of no thickness', () => {
    expect(problemsOf(plate([]), sampleStock({ thicknessMm: 0 }))).toMatchObject([{ code: 'stockUnknown' }]);
  });

  it('all bends at once, not only the first', () => {
    const bends = [
      { ...across('a', 40), bendAngleDeg: 0 },
      { ...across('b', 60), insideRadiusMm: -1 },
    ];
    expect(problemsOf(plate(bends)).map(({ ids }) => ids[0])).toEqual(['a', 'b']);
  });
});
