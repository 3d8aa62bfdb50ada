import {
  CLEARANCE_SOURCE,
  COUNTERSINK_SOURCE,
  HEX_SOURCE,
  INCH_CLEARANCE_SOURCE,
  INCH_TAP_SOURCE,
  METRIC_FASTENERS,
  RIVET_NUT_SOURCE,
  TAP_DRILL_SOURCE,
  WASHER_SOURCE,
} from '@foldwright/shared/stock/fastener-tables';
import type { TableSource } from '@foldwright/shared/stock/figure';
import { FINISHES } from '@foldwright/shared/stock/finishes';
import { GAUGE_SOURCE, GAUGE_TABLE } from '@foldwright/shared/stock/gauges';
import { INCH_CLEARANCES, INCH_TAPS } from '@foldwright/shared/stock/inch-fasteners';
import { STOCK_THICKNESSES } from '@foldwright/shared/stock/stock-thicknesses';
import { TEMPLATE_KINDS } from '@foldwright/shared/stock/template-kinds';
import { V_DIE_CHART, V_DIE_SOURCE } from '@foldwright/shared/stock/v-dies';
import { MM_PER_INCH, formatDecimal } from '@foldwright/shared/units/length';

/** A column of a trade table. `source` is given where the whole column comes from one place. */
export interface TradeColumn {
  readonly label: string;
  readonly isFigure: boolean;
  readonly source?: TableSource;
}

/** A row: one text per column, and where the row comes from when the columns don't say. */
export interface TradeRow {
  readonly cells: readonly string[];
  readonly source: TableSource | null;
}

/** One table as the page shows it. */
export interface TradeTable {
  readonly id: string;
  readonly heading: string;
  readonly note: string;
  readonly columns: readonly TradeColumn[];
  readonly rows: readonly TradeRow[];
}

const word = (label: string): TradeColumn => ({ label, isFigure: false });
const figure = (label: string, source?: TableSource): TradeColumn =>
  source === undefined ? { label, isFigure: true } : { label, isFigure: true, source };
const mm = (value: number | null, decimals = 2): string => (value === null ? '–' : formatDecimal(value, decimals));
const inch = (valueIn: number | null): string =>
  valueIn === null ? '–' : `${valueIn.toFixed(4)} (${formatDecimal(valueIn * MM_PER_INCH, 2)})`;
const bare = (cells: readonly string[]): TradeRow => ({ cells, source: null });

/** The read-only tables of the trade that holes, bends and sheets are taken from; lengths in mm unless they say inches. */
export const TRADE_TABLES: readonly TradeTable[] = [
  {
    id: 'dies',
    heading: 'V dies',
    note: 'Air bends at 90°. The shortest flange still bears on both shoulders of the die.',
    columns: [
      figure('V opening', V_DIE_SOURCE),
      figure('Shortest flange', V_DIE_SOURCE),
      figure('Inside radius in mild steel', V_DIE_SOURCE),
    ],
    rows: V_DIE_CHART.map((row) => bare([mm(row.openingMm), mm(row.minimumFlangeMm), mm(row.steelRadiusMm)])),
  },
  {
    id: 'metric',
    heading: 'Metric fasteners',
    note: 'Holes to cut, and room for heads, washers and spanners.',
    columns: [
      word('Thread'),
      figure('Pitch', TAP_DRILL_SOURCE),
      figure('Close', CLEARANCE_SOURCE),
      figure('Medium', CLEARANCE_SOURCE),
      figure('Coarse', CLEARANCE_SOURCE),
      figure('Tap drill', TAP_DRILL_SOURCE),
      figure('Rivet nut', RIVET_NUT_SOURCE),
      figure('Countersink', COUNTERSINK_SOURCE),
      figure('Washer', WASHER_SOURCE),
      figure('Large washer', WASHER_SOURCE),
      figure('Across flats', HEX_SOURCE),
    ],
    rows: METRIC_FASTENERS.map((row) =>
      bare([
        row.thread,
        mm(row.pitchMm),
        mm(row.clearanceMm.close),
        mm(row.clearanceMm.medium),
        mm(row.clearanceMm.coarse),
        mm(row.tapDrillMm),
        mm(row.rivetNutMm),
        row.countersinkMm === null ? '–' : `${mm(row.countersinkMm.smallest)} to ${mm(row.countersinkMm.largest)}`,
        row.washerMm === null ? '–' : `${mm(row.washerMm.outside)} × ${mm(row.washerMm.thickness)}`,
        mm(row.largeWasherOutsideMm),
        mm(row.acrossFlatsMm),
      ]),
    ),
  },
  {
    id: 'inch-clearance',
    heading: 'Inch clearance holes',
    note: 'Inches, with mm beside them.',
    columns: [
      word('Size'),
      figure('Close', INCH_CLEARANCE_SOURCE),
      figure('Normal', INCH_CLEARANCE_SOURCE),
      figure('Loose', INCH_CLEARANCE_SOURCE),
    ],
    rows: INCH_CLEARANCES.map((row) => bare([row.size, inch(row.closeIn), inch(row.normalIn), inch(row.looseIn)])),
  },
  {
    id: 'inch-taps',
    heading: 'Inch tap drills',
    note: 'Inches, with mm beside them.',
    columns: [word('Thread'), figure('Drill', INCH_TAP_SOURCE)],
    rows: INCH_TAPS.map((row) => bare([row.thread, inch(row.drillIn)])),
  },
  {
    id: 'gauges',
    heading: 'Gauges',
    note: 'The same number is another thickness in another family. Inches, with mm beside them.',
    columns: [
      word('Gauge'),
      figure('Steel', GAUGE_SOURCE),
      figure('Galvanised', GAUGE_SOURCE),
      figure('Stainless', GAUGE_SOURCE),
      figure('Non-ferrous', GAUGE_SOURCE),
    ],
    rows: GAUGE_TABLE.map((row) =>
      bare([
        String(row.gauge),
        inch(row.steelIn),
        inch(row.galvanisedIn),
        inch(row.stainlessIn),
        inch(row.nonFerrousIn),
      ]),
    ),
  },
  {
    id: 'thicknesses',
    heading: 'Sheet as it is sold',
    note: 'Thicknesses in mm.',
    columns: [word('Product'), figure('Thicknesses')],
    rows: STOCK_THICKNESSES.map((row) => ({
      cells: [row.product, row.thicknessesMm.map((thicknessMm) => formatDecimal(thicknessMm, 2)).join(', ')],
      source: row,
    })),
  },
  {
    id: 'finishes',
    heading: 'Finishes',
    note: 'What a finish adds to each side; a hole loses twice that on its diameter.',
    columns: [word('Finish'), figure('Build-up per side, mm')],
    rows: FINISHES.map((row) => ({
      cells: [
        row.name,
        row.buildUpPerSideMm.high === 0
          ? 'none'
          : `${formatDecimal(row.buildUpPerSideMm.low, 4)} to ${formatDecimal(row.buildUpPerSideMm.high, 4)}`,
      ],
      source: row,
    })),
  },
  {
    id: 'templates',
    heading: 'What templates are made of',
    note: 'Usual thicknesses, mm.',
    columns: [word('Material'), figure('Usual thickness')],
    rows: TEMPLATE_KINDS.map((row) => ({
      cells: [row.name, row.usualThicknessMm === null ? 'measure it' : mm(row.usualThicknessMm)],
      source: row,
    })),
  },
];
