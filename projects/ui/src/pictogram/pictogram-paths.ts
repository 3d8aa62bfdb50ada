/** Line weights of a pictogram's paths. `section` is sheet cut through, `tinted` metal in plan, `hole` shows the paper. */
export type PictogramStroke =
  'plain' | 'section' | 'thin' | 'dashed' | 'thin dashed' | 'thin tinted' | 'tinted' | 'solid' | 'hole' | 'dots';

/** One path of a pictogram on a 24 px grid. */
export interface PictogramPath {
  readonly stroke: PictogramStroke;
  readonly d: string;
}

const path = (d: string, stroke: PictogramStroke = 'plain'): PictogramPath => ({ stroke, d });

/** The trade's own signs, drawn for Foldwright. */
export const TRADE_PICTOGRAMS = {
  'bend-towards': [
    path('M3 19h8.5a5 5 0 0 0 5-5V5', 'section'),
    path('M4 15.6h6.5', 'thin'),
    path('M16 19h5.5', 'thin dashed'),
    path('M21.4 16a9 9 0 0 0-1.3-5.2M18.3 12.6l1.6-2.2 2.3 1.4', 'thin'),
  ],
  'bend-away': [
    path('M3 7h8.5a5 5 0 0 1 5 5v8.5', 'section'),
    path('M4 3.6h6.5', 'thin'),
    path('M16 7h5.5', 'thin dashed'),
    path('M21.4 10a9 9 0 0 1-1.3 5.2M18.3 13.4l1.6 2.2 2.3-1.4', 'thin'),
  ],
  hem: [
    path('M3 17.5h13.2a3.7 3.7 0 0 0 0-7.4H8.5', 'section'),
    path('M5.5 6.5c3-2.6 9.5-2.8 12.5-.6M15.8 4.2l2.3 1.7-1.4 2.4', 'thin'),
  ],
  relief: [path('M3 20.5V11.5h3.8v2.3a1.8 1.8 0 0 0 3.6 0V3.5H21v17z', 'tinted'), path('M12 11.5h8.5', 'thin dashed')],
  'clearance-hole': [
    path('M4.4 12a7.6 7.6 0 1 0 15.2 0a7.6 7.6 0 1 0 -15.2 0z'),
    path('M7.1 12a4.9 4.9 0 1 0 9.8 0a4.9 4.9 0 1 0 -9.8 0z', 'thin tinted'),
    path('M12 2v2.6M12 19.4V22M2 12h2.6M19.4 12H22M12 10.8v2.4M10.8 12h2.4', 'thin'),
  ],
  'tapped-hole': [
    path('M6.8 12a5.2 5.2 0 1 0 10.4 0a5.2 5.2 0 1 0 -10.4 0z', 'tinted'),
    path('M12 4a8 8 0 1 0 8 8', 'thin'),
    path('M12 2v1M12 21v1M2 12h1M21 12h1M12 10.8v2.4M10.8 12h2.4', 'thin'),
  ],
  'rivet-nut': [
    path('M2 9.5h4.8M17.2 9.5H22', 'section'),
    path('M5.5 6.7h13M8.5 6.7v4.3c0 1.3-2 1.8-2 3.2s2 1.7 2 3V21h7v-3.8c0-1.3 2-1.6 2-3s-2-1.9-2-3.2V6.7', 'tinted'),
    path('M12 3v18.5', 'thin dashed'),
  ],
  'clinch-nut': [
    path('M2 17.5h5.2M16.8 17.5H22', 'section'),
    path('M6.2 15.5V7.5l1.5-1.5h8.6l1.5 1.5v8z', 'tinted'),
    path('M8.7 15.5v3.2h6.6v-3.2'),
    path('M10 6v12.7M14 6v12.7', 'thin'),
  ],
  countersink: [
    path('M2.5 8h4l3.5 4.8V18H2.5', 'tinted'),
    path('M21.5 8h-4L14 12.8V18h7.5', 'tinted'),
    path('M12 4v17', 'thin dashed'),
    path('M6.5 5.2v-1h11v1', 'thin'),
  ],
  slot: [
    path(
      'M6.8 7.7h10.4a4.3 4.3 0 0 1 4.3 4.3v0a4.3 4.3 0 0 1 -4.3 4.3h-10.4a4.3 4.3 0 0 1 -4.3 -4.3v-0a4.3 4.3 0 0 1 4.3 -4.3z',
      'tinted',
    ),
    path('M1 12h22', 'thin dashed'),
    path('M6.8 5.5v13M17.2 5.5v13', 'thin'),
  ],
  lightening: [
    path('M5 4h14a2 2 0 0 1 2 2v12a2 2 0 0 1 -2 2h-14a2 2 0 0 1 -2 -2v-12a2 2 0 0 1 2 -2z', 'tinted'),
    path('M5.7 8.3a1.9 1.9 0 1 0 3.8 0a1.9 1.9 0 1 0 -3.8 0z', 'hole'),
    path('M14.5 8.3a1.9 1.9 0 1 0 3.8 0a1.9 1.9 0 1 0 -3.8 0z', 'hole'),
    path('M10.1 12a1.9 1.9 0 1 0 3.8 0a1.9 1.9 0 1 0 -3.8 0z', 'hole'),
    path('M5.7 15.7a1.9 1.9 0 1 0 3.8 0a1.9 1.9 0 1 0 -3.8 0z', 'hole'),
    path('M14.5 15.7a1.9 1.9 0 1 0 3.8 0a1.9 1.9 0 1 0 -3.8 0z', 'hole'),
  ],
  grain: [
    path(
      'M4 4h16a1.5 1.5 0 0 1 1.5 1.5v13a1.5 1.5 0 0 1 -1.5 1.5h-16a1.5 1.5 0 0 1 -1.5 -1.5v-13a1.5 1.5 0 0 1 1.5 -1.5z',
      'tinted',
    ),
    path('M5.5 12h13M8 9.9 5.5 12 8 14.1M16 9.9l2.5 2.1-2.5 2.1'),
    path('M6 7.2h7M15.5 7.2h2.5M6 16.8h3M11.5 16.8H18', 'thin'),
  ],
  'face-a': [
    path('M4 3.5h11l5 5v12H4z', 'tinted'),
    path('M15 3.5v5h5', 'thin'),
    path('M8.6 17.2l3.3-8 3.3 8M9.8 14.5h4.2'),
  ],
  'face-b': [
    path('M20 3.5H9l-5 5v12h16z'),
    path('M9 3.5v5H4M6.5 18l-2 2M20 5l-3 3M20 9l-2.5 2.5', 'thin'),
    path('M9.7 9.5v7.7h3.1a2.1 2.1 0 0 0 0-4.2H9.7M12.5 13a1.75 1.75 0 0 0 0-3.5H9.7'),
  ],
  deburr: [
    path('M2 10h9.5a2.5 2.5 0 0 1 2.5 2.5v3a2.5 2.5 0 0 1-2.5 2.5H2', 'tinted'),
    path('M14 10h3M14 18l2.5 2.5', 'thin dashed'),
    path('M12.5 3.5 21 12'),
    path('M14.7 2.8l-1.5 1.5M17 5.1l-1.5 1.5M19.3 7.4l-1.5 1.5M21.6 9.7l-1.5 1.5', 'thin'),
  ],
  mask: [
    path('M3 13.5a7.5 7.5 0 1 0 15 0a7.5 7.5 0 1 0 -15 0z', 'tinted'),
    path('M15 7.5l4-4.2 2 2-4 4.2'),
    path('M4.8 14.5l6.7-6.7M6.2 18.1l8.7-8.7M9.8 19.5l7-7', 'thin'),
  ],
  coat: [
    path('M3 20h18', 'section'),
    path('M3 16.3h4.5c1.5 0 1.5-.9 3-.9s1.5.9 3 .9H21'),
    path('M7 5h.01M12 3.8h.01M17 5h.01M9.5 8h.01M14.5 8h.01M7 11h.01M12 11.8h.01M17 11h.01', 'dots'),
  ],
  'scale-sheet': [
    path('M4.5 2.5h15a1 1 0 0 1 1 1v17a1 1 0 0 1 -1 1h-15a1 1 0 0 1 -1 -1v-17a1 1 0 0 1 1 -1z', 'tinted'),
    path('M5.5 4.5h3v3h-3zM15.5 4.5h3v3h-3zM5.5 16.5h3v3h-3zM15.5 16.5h3v3h-3z', 'solid'),
    path('M10 18h4.5M10 17v2M12.2 17v2M14.5 17v2', 'thin'),
    path('M8.5 13.5v-3h3v-2h4v5z'),
  ],
  'card-template': [
    path('M8.5 3h7v5.5H21v7h-5.5V21h-7v-5.5H3v-7h5.5z', 'tinted'),
    path('M8.5 8.5h7v7h-7z', 'thin dashed'),
  ],
  'full-size-print': [
    path('M12 2.5v19M2.5 12h19', 'thin dashed'),
    path('M3.5 2.5h17a1 1 0 0 1 1 1v17a1 1 0 0 1 -1 1h-17a1 1 0 0 1 -1 -1v-17a1 1 0 0 1 1 -1z'),
    path('M6 17.5V9.5a3 3 0 0 1 3-3h9v5h-6v6z', 'tinted'),
  ],
  'cut-package': [
    path('M6 7V3.5h12V7', 'thin'),
    path('M8.5 5.3h4', 'thin'),
    path(
      'M4 7h16a1.5 1.5 0 0 1 1.5 1.5v10a1.5 1.5 0 0 1 -1.5 1.5h-16a1.5 1.5 0 0 1 -1.5 -1.5v-10a1.5 1.5 0 0 1 1.5 -1.5z',
      'tinted',
    ),
    path('M2.5 13.5h19M8 7v13'),
    path('M8 13.5c-2.6-3 .2-4.5 0 0 2.6-3 4 .6 0 0M8 13.5l-1.8 2.6M8 13.5l2 2.4', 'thin'),
  ],
  'fit-log': [
    path('M5.5 3H17a2 2 0 0 1 2 2v16H7.5a2 2 0 0 1-2-2z', 'tinted'),
    path('M3.5 7h3.5M3.5 12h3.5M3.5 17h3.5', 'thin'),
    path('M9.5 7v8.5H16'),
    path('M12 10.3l1.6 1.7 3-3.7'),
  ],
  'hose-pass-through': [
    path('M2.5 13.5a8 8 0 1 0 16 0a8 8 0 1 0 -16 0z'),
    path('M5.7 13.5a4.8 4.8 0 1 0 9.6 0a4.8 4.8 0 1 0 -9.6 0z', 'tinted'),
    path('M8 9.4 15.3 2M14.6 16 22 8.7'),
    path('M12.5 8.9l3 3M15.3 6.1l3 3', 'thin'),
  ],
  'nick-code': [
    path(
      'M2 8h2.5a1.6 1.6 0 0 0 3.2 0h1.8a1.6 1.6 0 0 0 3.2 0h4.3a1.6 1.6 0 0 0 3.2 0H22v9.5c-6.5 2-13.5-2-20 0z',
      'tinted',
    ),
  ],
} as const satisfies Record<string, readonly PictogramPath[]>;

/** Signs for the verbs of the application. */
export const ICONS = {
  undo: [path('M8.5 5 4.5 9l4 4'), path('M5 9h9a5.5 5.5 0 0 1 0 11h-3')],
  redo: [path('M15.5 5l4 4-4 4'), path('M19 9h-9a5.5 5.5 0 0 0 0 11h3')],
  fit: [
    path('M3 8V3h5M21 8V3h-5M3 16v5h5M21 16v5h-5'),
    path('M8.5 8.5h7a1 1 0 0 1 1 1v5a1 1 0 0 1 -1 1h-7a1 1 0 0 1 -1 -1v-5a1 1 0 0 1 1 -1z', 'tinted'),
  ],
  moon: [path('M19.5 14.5A8 8 0 1 1 10 4.3a6.5 6.5 0 0 0 9.5 10.2z', 'tinted')],
  camera: [
    path('M4.5 6h15a2 2 0 0 1 2 2v10a2 2 0 0 1 -2 2h-15a2 2 0 0 1 -2 -2v-10a2 2 0 0 1 2 -2z', 'tinted'),
    path('M8 13a4 4 0 1 0 8 0a4 4 0 1 0 -8 0z'),
    path('M8 6l1.5-2.5h5L16 6'),
  ],
  search: [path('M4.5 10.5a6 6 0 1 0 12 0a6 6 0 1 0 -12 0z'), path('M15 15l5.5 5.5')],
  tick: [path('M5 12.5l4.5 4.5L19.5 7')],
  go: [path('M4 12h15M13.5 6.5 19 12l-5.5 5.5')],
  'edge-length': [path('M4 19V9l5-5h11'), path('M9 4h11', 'section')],
  slide: [path('M4 17h16', 'section'), path('M4 8h16', 'thin dashed'), path('M12 15V6M9.5 8.5 12 6l2.5 2.5', 'thin')],
  'square-up': [path('M5 4v15h15'), path('M5 14h5v5', 'thin'), path('M7 4.5l13 1.2', 'thin dashed')],
  flange: [
    path('M4 20v-7h16v7z', 'tinted'),
    path('M4 13h16', 'thin dashed'),
    path('M6.5 13V5h11v8'),
    path('M12 10.5V7M10.3 8.7 12 7l1.7 1.7', 'thin'),
  ],
  round: [path('M4 20V11a6 6 0 0 1 6-6h10'), path('M4 5h4M4 5v4', 'thin dashed')],
  split: [path('M3 12h7M14 12h7', 'section'), path('M12 6.5v11', 'thin')],
  calliper: [path('M3 4h18v4.5H9V20H6.5V8.5H3z', 'tinted'), path('M13 8.5V16h2.5V8.5')],
  tap: [
    path('M7 9a5 5 0 1 0 10 0a5 5 0 1 0 -10 0z', 'tinted'),
    path('M12 9v.01', 'section'),
    path('M12 14v7M9 18l3 3 3-3', 'thin'),
  ],
  loupe: [
    path('M5 4h14a1 1 0 0 1 1 1v14a1 1 0 0 1 -1 1h-14a1 1 0 0 1 -1 -1v-14a1 1 0 0 1 1 -1z', 'tinted'),
    path('M7 4v2.5M10 4v1.5M13 4v2.5M16 4v1.5M4 8h2.5M4 11h1.5M4 14h2.5M4 17h1.5', 'thin'),
    path('M10 17c1-4 3-6 7-7'),
  ],
  document: [path('M5.5 2.5H15l4 4v15H5.5z', 'tinted'), path('M8.5 11h7M8.5 14h7M8.5 17h4', 'thin')],
  comment: [path('M4 5h16v11h-9l-4.5 4v-4H4z', 'tinted'), path('M8 9h8M8 12h5', 'thin')],
  bolt: [
    path('M8 3h8v4.5H8z', 'tinted'),
    path('M10 7.5v13h4v-13'),
    path('M10 11.5l4-1.3M10 14.5l4-1.3M10 17.5l4-1.3', 'thin'),
  ],
  cart: [
    path('M3 5h2.5l2.2 10h10.6L20.5 8H7'),
    path('M8.1 19a1.4 1.4 0 1 0 2.8 0a1.4 1.4 0 1 0 -2.8 0z'),
    path('M15.6 19a1.4 1.4 0 1 0 2.8 0a1.4 1.4 0 1 0 -2.8 0z'),
  ],
  sun: [
    path('M12 7.5a4.5 4.5 0 1 0 0 9a4.5 4.5 0 1 0 0-9z', 'tinted'),
    path('M12 2.5v2M12 19.5v2M2.5 12h2M19.5 12h2M5.3 5.3l1.4 1.4M17.3 17.3l1.4 1.4M5.3 18.7l1.4-1.4M17.3 6.7l1.4-1.4'),
  ],
  back: [path('M14.5 5 7.5 12l7 7')],
  down: [path('M6 9.5l6 6 6-6')],
  close: [path('M6 6l12 12M18 6 6 18')],
  add: [path('M12 5v14M5 12h14')],
  remove: [path('M5 12h14')],
  delete: [path('M6 7.5h12l-1 13H7z', 'tinted'), path('M4 7.5h16M9 7V4h6v3'), path('M10.2 11v6M13.8 11v6', 'thin')],
  download: [path('M12 3.5v11M7.5 10 12 14.5 16.5 10'), path('M4 17.5v3h16v-3')],
  upload: [path('M12 15V4M7.5 8.5 12 4l4.5 4.5'), path('M4 17.5v3h16v-3')],
  print: [path('M4 9h16v8H4z', 'tinted'), path('M7 9V3.5h10V9'), path('M7 14h10v6.5H7z')],
  person: [path('M12 4a4 4 0 1 0 0 8a4 4 0 1 0 0-8z', 'tinted'), path('M4.5 20.5c.6-4 3.6-6 7.5-6s6.9 2 7.5 6')],
  leave: [path('M10 4H5v16h5'), path('M10 12h10M16 8l4 4-4 4')],
  swap: [path('M5 8.500h13M14.5 5 18 8.5 14.5 12'), path('M19 15.500H6M9.5 12 6 15.5 9.5 19')],
  mail: [path('M3 5.500h18v13H3z', 'tinted'), path('M3 6.500l9 7 9-7')],
  clock: [path('M12 3.500a8.5 8.5 0 1 0 0 17a8.5 8.5 0 1 0 0-17z', 'tinted'), path('M12 7.500V12l3 2')],
  parcel: [
    path('M3.5 7.5 12 3.500l8.5 4v9L12 20.500l-8.5-4z', 'tinted'),
    path('M3.5 7.500l8.5 4 8.5-4M12 11.500v9', 'thin'),
  ],
  pay: [path('M2.5 5.500h19v13h-19z', 'tinted'), path('M2.5 9.500h19', 'section'), path('M5.5 15h4', 'thin')],
  scribe: [path('M5 19 17.5 6.500M14.5 4.500l5 5'), path('M3 21l2-2', 'thin')],
  punched: [
    path(
      'M12 5.500a6.5 6.5 0 1 0 0 13a6.5 6.5 0 1 0 0-13zM12 10.300a1.7 1.7 0 1 1 0 3.400a1.7 1.7 0 1 1 0-3.400z',
      'solid',
    ),
  ],
  'mock-up': [path('M4 5h16v14H4z', 'dashed'), path('M8.5 5v14M15.5 5v14', 'thin')],
  'to-come': [path('M6 12h.01M12 12h.01M18 12h.01', 'dots')],
  dimensions: [path('M7 9h14v11H7z', 'tinted'), path('M7 5.500h14M7 4v3M21 4v3M3.5 9v11M2 9h3M2 20h3', 'thin')],
  move: [
    path('M12 3v18M3 12h18'),
    path('M9.5 5.5 12 3l2.5 2.500M9.5 18.5 12 21l2.5-2.500M5.5 9.5 3 12l2.5 2.500M18.5 9.5 21 12l-2.5 2.5', 'thin'),
  ],
  angle: [path('M4 19h16', 'section'), path('M4 19 15 5', 'section'), path('M11 19a7.5 7.5 0 0 0-2.5-5.6', 'thin')],
  size: [path('M3 12h18M6 9l-3 3 3 3M18 9l3 3-3 3', 'thin'), path('M12 6a6 6 0 1 0 0 12a6 6 0 1 0 0-12z', 'tinted')],
  'zoom-in': [path('M10.5 4.500a6 6 0 1 0 0 12a6 6 0 1 0 0-12zM15 15l5.5 5.5'), path('M10.5 8v5M8 10.500h5', 'thin')],
  'zoom-out': [path('M10.5 4.500a6 6 0 1 0 0 12a6 6 0 1 0 0-12zM15 15l5.5 5.5'), path('M8 10.500h5', 'thin')],
  play: [path('M7 4.5 19 12 7 19.500z', 'tinted')],
  stop: [path('M6 6h12v12H6z', 'tinted')],
  again: [path('M19.5 12a7.5 7.5 0 1 1-2.2-5.3'), path('M19.5 3.500v4h-4')],
  copy: [path('M8 8h12v12H8z', 'tinted'), path('M16 8V4H4v12h4')],
  select: [path('M5 3.5 18.5 11l-6 1.7-2.7 5.800z', 'tinted')],
} as const satisfies Record<string, readonly PictogramPath[]>;

export type TradePictogramName = keyof typeof TRADE_PICTOGRAMS;
export type PictogramName = TradePictogramName | keyof typeof ICONS;

/** Every pictogram by name. */
export const PICTOGRAMS: Readonly<Record<PictogramName, readonly PictogramPath[]>> = { ...TRADE_PICTOGRAMS, ...ICONS };
