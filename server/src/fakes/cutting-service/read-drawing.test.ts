import { readDrawing, UnreadableDrawing } from './read-drawing';
import { drawPlate } from './test-drawing';

const polyline = (closedFlag: number, corners: readonly (readonly [number, number, number?])[]) =>
  [
    '0\nSECTION\n2\nENTITIES\n0\nPOLYLINE\n8\nOUTLINE\n66\n1\n70',
    String(closedFlag),
    ...corners.map(([x, y, bulge = 0]) => `0\nVERTEX\n8\nOUTLINE\n10\n${x}\n20\n${y}\n42\n${bulge}`),
    '0\nSEQEND\n0\nENDSEC\n0\nEOF\n',
  ].join('\n');

describe('readDrawing', () => {
  it('joins loose lines whichever way they run', () => {
    const { contours } = readDrawing(drawPlate({ widthMm: 100, heightMm: 40 }));
    expect(contours).toHaveLength(1);
    expect(contours[0]).toMatchObject({ isClosed: true, lengthMm: 280, minX: 0, maxX: 100, minY: 0, maxY: 40 });
  });

  it('sees that an outline is open', () => {
    expect(readDrawing(drawPlate({ widthMm: 100, heightMm: 40, isOpen: true })).contours[0]?.isClosed).toBe(false);
  });

  it('measures circles', () => {
    const { contours } = readDrawing(
      drawPlate({ widthMm: 100, heightMm: 40, holes: [{ x: 20, y: 20, diameterMm: 6.6 }] }),
    );
    const hole = contours.find((contour) => contour.layer === 'OPENING');
    expect(hole?.diameterMm).toBeCloseTo(6.6, 9);
    expect(hole?.lengthMm).toBeCloseTo(Math.PI * 6.6, 9);
  });

  it('follows bulges: a stadium of 100 by 40 with round ends', () => {
    const { contours } = readDrawing(
      polyline(1, [
        [20, 0],
        [80, 0, 1],
        [80, 40],
        [20, 40, 1],
      ]),
    );
    // Two straights of 60 and two half circles of radius 20.
    expect(contours[0]?.lengthMm).toBeCloseTo(120 + 40 * Math.PI, 6);
    expect(contours[0]?.minX).toBeCloseTo(0, 6);
    expect(contours[0]?.maxX).toBeCloseTo(100, 6);
  });

  it('follows bulges that run clockwise: a bite of radius 10 out of a side', () => {
    const { contours } = readDrawing(
      polyline(1, [
        [0, 0],
        [100, 0],
        [100, 40],
        [60, 40, -1],
        [40, 40],
        [0, 40],
      ]),
    );
    expect(contours[0]?.lengthMm).toBeCloseTo(260 + 10 * Math.PI, 6);
    expect(contours[0]?.maxY).toBeCloseTo(40, 6);
  });

  it('refuses what is no drawing', () => {
    expect(() => readDrawing('a letter\nto the shop\n')).toThrow(UnreadableDrawing);
    expect(() => readDrawing('0\nSECTION\n2\nHEADER\n')).toThrow(UnreadableDrawing);
  });
});
