import type { Trace } from '../fitting/trace';
import { loopBounds, loopFromBulges, pointInLoop, signedArea } from '../geometry/loop';
import { type TraceAnswers, documentFromTrace, usualBendDirection } from './document-from-trace';
import { checkInvariants } from './invariants';
import { mirrorDocument, turnDocumentOver } from './mirror-document';
import { suggestPurposes } from './suggest-purposes';
import v1 from './upgrades/fixtures/v1.json';
import { partDocumentSchema } from '../contracts/part-document-schema';

/** A C-shaped template, drawn clockwise, with a full circle as a cut-out. */
const trace: Trace = {
  units: 'mm',
  frame: 'scale-sheet',
  outer: [
    { kind: 'line', from: [50, 40], to: [50, 120] },
    { kind: 'line', from: [50, 120], to: [150, 120] },
    { kind: 'line', from: [150, 120], to: [150, 100] },
    { kind: 'line', from: [150, 100], to: [70, 100] },
    { kind: 'line', from: [70, 100], to: [70, 60] },
    { kind: 'line', from: [70, 60], to: [150, 60] },
    { kind: 'line', from: [150, 60], to: [150, 50] },
    { kind: 'arc', from: [150, 50], to: [140, 40], centre: [140, 50], clockwise: true },
    { kind: 'line', from: [140, 40], to: [50, 40] },
  ],
  cutouts: [[{ kind: 'arc', from: [120, 110], to: [120, 110], centre: [115, 110], clockwise: false }]],
  holes: [{ centre: [60, 50], diameterMm: 6.55 }],
  slots: [{ from: [80, 110], to: [90, 110], widthMm: 6 }],
  uncertaintyMm: 0.2,
  method: 'markers',
  pixelsPerMm: 8,
  markersUsed: 20,
  tiltDeg: 20,
  bands: [],
  mostlyFrom: 'card thickness',
  warnings: [],
  timingsMs: { total: 1 },
};
const answers: TraceAnswers = {
  templateKind: 'single-wall',
  thicknessMm: 3,
  bearing: 'hidden',
  hinge: { kind: 'liner', face: 'A' },
  calibration: { scaleX: 1, scaleY: 1 },
};
const counting = () => {
  let last = 0;
  return (prefix: string) => `${prefix}-${(last += 1)}`;
};

describe('documentFromTrace', () => {
  const document = documentFromTrace(trace, answers, counting());

  it('moves the lower-left corner to the origin and turns loops the right way round', () => {
    const outer = loopFromBulges(document.layout.outer.edges);
    expect(loopBounds(outer)).toEqual({ min: { x: 0, y: 0 }, max: { x: 100, y: 80 } });
    // 100 x 80 less the bay of 80 x 40, less the rounding's (1 - π/4)·10².
    expect(signedArea(outer)).toBeCloseTo(8000 - 3200 - (1 - Math.PI / 4) * 100, 6);
    const cut = loopFromBulges(document.layout.cutouts[0]?.edges ?? []);
    expect(signedArea(cut)).toBeCloseTo(-Math.PI * 25, 6);
    expect(checkInvariants(document)).toEqual([]);
  });

  it.each([30, -44, 17.3, 92])('squares a template up that lay %d° round on the sheet', (turnDeg) => {
    const [cosine, sine] = [Math.cos((turnDeg * Math.PI) / 180), Math.sin((turnDeg * Math.PI) / 180)];
    const turned = ([x, y]: readonly [number, number]): readonly [number, number] => [
      x * cosine - y * sine,
      x * sine + y * cosine,
    ];
    const lying: Trace = {
      ...trace,
      outer: trace.outer.map((piece) =>
        piece.kind === 'line'
          ? { ...piece, from: turned(piece.from), to: turned(piece.to) }
          : { ...piece, from: turned(piece.from), to: turned(piece.to), centre: turned(piece.centre) },
      ),
      cutouts: [],
      holes: trace.holes.map((hole) => ({ ...hole, centre: turned(hole.centre) })),
      slots: trace.slots.map((slot) => ({ ...slot, from: turned(slot.from), to: turned(slot.to) })),
    };
    const square = documentFromTrace(lying, answers, counting());
    const sizes = loopBounds(loopFromBulges(square.layout.outer.edges))?.max ?? { x: 0, y: 0 };
    // 92 degrees are nearer to a quarter turn: the sides change places.
    expect([sizes.x, sizes.y].map((size) => Number(size.toFixed(6)))).toEqual(turnDeg === 92 ? [80, 100] : [100, 80]);
    const hole = square.layout.features[0];
    expect(hole?.kind === 'hole' ? Math.min(hole.centre.x, sizes.x - hole.centre.x) : NaN).toBeCloseTo(10, 6);
  });

  it('keeps holes and slots where they were on the template', () => {
    expect(document.layout.features).toMatchObject([
      { kind: 'hole', centre: { x: 10, y: 10 }, purpose: { kind: 'plain', diameterMm: 6.55 } },
      { kind: 'slot', from: { x: 30, y: 70 }, to: { x: 40, y: 70 }, widthMm: 6 },
    ]);
  });

  it('stands on a base that lies in the sheet, although the centre of area does not', () => {
    expect(pointInLoop(document.layout.baseAnchor, loopFromBulges(document.layout.outer.edges), 0.5)).toBe('inside');
  });

  it('keeps the answers: bearing on the hidden face is face B, lengths lie in the creases', () => {
    expect(document.template).toEqual({
      kind: 'single-wall',
      thicknessMm: 3,
      reading: { readOn: 'crease', bearingFace: 'B', hinge: { kind: 'liner', face: 'A' } },
    });
    expect(usualBendDirection('inside')).toBe('towards');
    const outside = documentFromTrace(trace, { ...answers, showing: 'outside' }, counting());
    expect(outside.template?.flangesFold).toBe('away');
    expect(turnDocumentOver(outside).template?.flangesFold).toBe('towards');
    expect(outside.layout.outer.edges.map(({ start }) => start)).toEqual(
      document.layout.outer.edges.map(({ start }) => start),
    );
  });

  it('lets callipers overrule the scale of one axis', () => {
    const scaled = documentFromTrace(trace, { ...answers, calibration: { scaleX: 1.01, scaleY: 1 } }, counting());
    expect(loopBounds(loopFromBulges(scaled.layout.outer.edges))?.max.x).toBeCloseTo(101, 9);
    expect(loopBounds(loopFromBulges(scaled.layout.outer.edges))?.max.y).toBeCloseTo(80, 9);
  });

  it('says what is missing when there is no outline', () => {
    expect(() => documentFromTrace({ ...trace, outer: [] }, answers, counting())).toThrow(RangeError);
  });
});

describe('mirrorDocument and turnDocumentOver', () => {
  const document = partDocumentSchema.parse(v1);

  it('makes the other hand: mirrored within its width, towards stays towards', () => {
    const mirrored = mirrorDocument(document);
    expect(signedArea(loopFromBulges(mirrored.layout.outer.edges))).toBeCloseTo(
      signedArea(loopFromBulges(document.layout.outer.edges)),
      9,
    );
    expect(mirrored.layout.features[0]).toMatchObject({ centre: { x: 70, y: 10 } });
    expect(mirrored.layout.bends[0]).toMatchObject({ direction: 'towards', line: { from: { x: 30, y: 0 } } });
    expect(mirrorDocument(mirrored)).toEqual(document);
  });

  it('turns the sheet over: faces and directions change places too', () => {
    const turned = turnDocumentOver(document);
    expect(turned.layout.bends[0]).toMatchObject({ direction: 'away' });
    expect(turned.template?.reading).toEqual({
      readOn: 'crease',
      bearingFace: 'A',
      hinge: { kind: 'liner', face: 'B' },
    });
    expect(turnDocumentOver(turned)).toEqual(document);
  });
});

describe('suggestPurposes', () => {
  it('takes a measured 6.55 for M6, medium', () => {
    const [first] = suggestPurposes(6.55, 0.2);
    expect(first?.purpose).toEqual({ kind: 'clearance', thread: 'M6', fit: 'medium' });
    expect(first?.differenceMm).toBeCloseTo(0.05, 9);
  });

  it('offers a clearance before a tapped hole of the same size', () => {
    // 5.0 is M6's tap drill and M3's rivet nut; no clearance lies that near.
    expect(suggestPurposes(5, 0.05).map(({ purpose }) => purpose.kind)).toEqual(['tapped', 'rivet-nut']);
    expect(suggestPurposes(50, 0.2)).toEqual([]);
  });
});
