/** DXF written by hand for tests of the shop: a plate with holes and straight bend lines across it. */
export interface PlateDrawing {
  readonly widthMm: number;
  readonly heightMm: number;
  readonly holes?: readonly { readonly x: number; readonly y: number; readonly diameterMm: number }[];
  /** Bend lines across the plate at these x. */
  readonly towardAtX?: readonly number[];
  readonly isOpen?: boolean;
}

const pair = (code: number, value: string | number) => `${code}\n${value}`;

/** The drawing as DXF text, outline in four lines. */
export function drawPlate({ widthMm, heightMm, holes = [], towardAtX = [], isOpen = false }: PlateDrawing): string {
  const line = (layer: string, x1: number, y1: number, x2: number, y2: number) =>
    [pair(0, 'LINE'), pair(8, layer), pair(10, x1), pair(20, y1), pair(11, x2), pair(21, y2)].join('\n');
  const sides = [
    line('OUTLINE', 0, 0, widthMm, 0),
    // Drawn backwards on purpose: the reader joins pieces whichever way they run.
    line('OUTLINE', widthMm, heightMm, widthMm, 0),
    line('OUTLINE', widthMm, heightMm, 0, heightMm),
    ...(isOpen ? [] : [line('OUTLINE', 0, heightMm, 0, 0)]),
  ];
  const circles = holes.map((hole) =>
    [pair(0, 'CIRCLE'), pair(8, 'OPENING'), pair(10, hole.x), pair(20, hole.y), pair(40, hole.diameterMm / 2)].join(
      '\n',
    ),
  );
  const folds = towardAtX.map((x) => line('FOLD-TOWARD', x, 0, x, heightMm));
  const body = [...sides, ...circles, ...folds].join('\n');
  return `${pair(0, 'SECTION')}\n${pair(2, 'ENTITIES')}\n${body}\n${pair(0, 'ENDSEC')}\n${pair(0, 'EOF')}\n`;
}
