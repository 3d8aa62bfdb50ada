import type { Layout, OutlineEdge } from '../../layout';
import { lLayout, sampleBend, sampleLayout, sampleLoop } from '../sample-layouts';
import type { SampleBend } from '../sample-layouts';
import { MILD } from './named-part';
import type { NamedPart } from './named-part';

/** Corners with the bulge of the edge that starts there: x, y, bulge. */
function outlined(corners: readonly (readonly [number, number, number?])[], bend: SampleBend, x: number): Layout {
  const edges = corners.map(([cornerX, y, bulge = 0], index): OutlineEdge => {
    return { id: `outer-${String(index + 1)}`, start: { x: cornerX, y }, bulge };
  });
  const layout = sampleLayout({
    outer: [],
    bends: [sampleBend('bend', { x: 0, y: 0 }, { x, y: 0 }, { reference: 'outsideApex', ...bend })],
    baseAnchor: { x: 30, y: -20 },
  });
  return { ...layout, outer: { id: 'outer', edges } };
}

/** Bulge of a quarter turn: tan 22.5. */
const QUARTER = Math.SQRT2 - 1;

/** Both sides lean the same way, 1 in 2. */
const leaning = (sideEdges: 'trimmed' | 'blended'): Layout =>
  outlined(
    [
      [-25, -50],
      [55, -50],
      [95, 30],
      [15, 30],
    ],
    { sideEdges },
    80,
  );

/** A flange of the given height on a plate of 80 x 50, its corners rounded by 10. */
const rounded = (heightMm: number): Layout =>
  outlined(
    [
      [0, -50],
      [80, -50],
      [80, heightMm - 10, QUARTER],
      [70, heightMm],
      [10, heightMm, QUARTER],
      [0, heightMm - 10],
    ],
    {},
    80,
  );

const window = sampleLoop('window', [
  { x: 43, y: 15 },
  { x: 57, y: 15 },
  { x: 57, y: 25 },
  { x: 43, y: 25 },
]);
/** Half rounds at both ends. */
const obround = { ...window, edges: window.edges.map((edge, index) => ({ ...edge, bulge: index % 2 })) };

/** Parts whose edges or openings meet a bend. All have the bend's tangent lines 4 on either side of its line. */
export const EDGES: readonly NamedPart[] = [
  {
    name: 'oblique sides, trimmed',
    stock: MILD,
    layout: outlined(
      [
        [0, -50],
        [80, -50],
        [80, 0],
        [65, 30],
        [15, 30],
        [0, 0],
      ],
      {},
      80,
    ),
    flatMm: [80, 76.178318],
    formedMm: [80, 50, 30],
    // The flange is 76 wide at its tangent line: 80 x 46 + (80 + 76) / 2 x 4.178318 + (76 + 50) / 2 x 26
    areaMm2: 5643.908804,
  },
  {
    name: 'sides leaning one way, trimmed',
    stock: MILD,
    layout: leaning('trimmed'),
    flatMm: [120, 76.178318],
    formedMm: [120, 50, 30],
    // 80 wide at every height
    areaMm2: 6094.26544,
  },
  {
    name: 'sides leaning one way, blended',
    stock: MILD,
    layout: leaning('blended'),
    flatMm: [120, 76.178318],
    formedMm: [120, 50, 30],
    // A blended side is an S about the middle of the trimmed one: the same area.
    areaMm2: 6094.26544,
  },
  {
    name: 'rounded corners that end on the tangent line',
    stock: MILD,
    layout: rounded(14),
    // 46 + 4.178318 + 10
    flatMm: [80, 60.178318],
    formedMm: [80, 50, 14],
    // 80 x 60.178318 - 2 x 100 (1 - pi / 4)
    areaMm2: 4771.345073,
  },
  {
    name: 'rounded corners that reach into the bend',
    stock: MILD,
    layout: rounded(12),
    // 46 + 4.178318 + 8
    flatMm: [80, 58.178318],
    formedMm: [80, 50, 12],
    // At the tangent line, 2 up its arc, a corner is 10 - sqrt 96 = 0.202041 in, having taken 20 - (2 sqrt 96 + 100 asin 0.2) / 2 = 0.134145
    // of 21.460184. 80 x 46 + (80 - 0.202041) x 4.178318 + 80 x 8 - 2 x 21.326039
    areaMm2: 4610.769166,
  },
  {
    name: 'side bulging out across the bend',
    stock: MILD,
    layout: outlined(
      [
        [0, -40],
        [60, -40],
        [60, -15, 1],
        [60, 15],
        [60, 30],
        [0, 30],
      ],
      {},
      75,
    ),
    // Half round of 15 about the bend line; at the tangent lines it stands out sqrt(15^2 - 4^2) = 14.456832.
    flatMm: [74.456832, 66.178318],
    formedMm: [74.456832, 40, 30],
    // Half a segment above 4: (225 acos(4 / 15) - 4 x 14.456832) / 2 = 117.433483. 60 x 36 + 60 x 26 + 2 x 117.433483 + 74.456832 x 4.178318
    areaMm2: 4265.971305,
  },
  {
    name: 'hole on the bend line, holes on both legs',
    stock: MILD,
    layout: {
      ...lLayout(50, 30),
      features: [
        { kind: 'hole', id: 'base', centre: { x: 20, y: 20 }, purpose: { kind: 'plain', diameterMm: 8 } },
        { kind: 'hole', id: 'bend', centre: { x: 50, y: 10 }, purpose: { kind: 'plain', diameterMm: 6 } },
        { kind: 'hole', id: 'flange', centre: { x: 70, y: 20 }, purpose: { kind: 'plain', diameterMm: 5 } },
      ],
    },
    flatMm: [76.178318, 40],
    formedMm: [50, 40, 30],
    // 76.178318 x 40 - pi (16 + 9 + 6.25)
    areaMm2: 2948.958016,
    // On the line: 46 + 4.178318 / 2. On the flange: 70 - 3.821682.
    holesMm: { base: [20, 20], bend: [48.089159, 10], flange: [66.178318, 20] },
  },
  {
    name: 'round-ended opening across the bend',
    stock: MILD,
    layout: { ...lLayout(50, 30), cutouts: [obround] },
    flatMm: [76.178318, 40],
    formedMm: [50, 40, 30],
    // Each leg loses half a disc of 5 and 3 x 10, the bend 4.178318 x 10: 76.178318 x 40 - 78.539816 - 60 - 41.78318
    areaMm2: 2866.809724,
  },
];
