import type { TableSource } from './figure';
import type { GaugeFamily } from './material';
import { MM_PER_INCH } from '../units/length';

/** Thickness in inches of one gauge number in each family; null where the family has no such gauge. */
export interface GaugeRow {
  readonly gauge: number;
  readonly steelIn: number;
  readonly galvanisedIn: number | null;
  readonly stainlessIn: number;
  readonly nonFerrousIn: number;
}

/**
 * Gauges 7 to 26. One number is four thicknesses: 18 is 0.0478 in cold-rolled steel, 0.0516 galvanised, 0.0500
 * stainless and 0.0403 in aluminium. The weights that gauges were once defined by never serve for a part's mass.
 */
export const GAUGE_TABLE: readonly GaugeRow[] = [
  { gauge: 7, steelIn: 0.1793, galvanisedIn: null, stainlessIn: 0.1875, nonFerrousIn: 0.1443 },
  { gauge: 8, steelIn: 0.1644, galvanisedIn: 0.1681, stainlessIn: 0.1719, nonFerrousIn: 0.1285 },
  { gauge: 9, steelIn: 0.1495, galvanisedIn: 0.1532, stainlessIn: 0.1563, nonFerrousIn: 0.1144 },
  { gauge: 10, steelIn: 0.1345, galvanisedIn: 0.1382, stainlessIn: 0.1406, nonFerrousIn: 0.1019 },
  { gauge: 11, steelIn: 0.1196, galvanisedIn: 0.1233, stainlessIn: 0.125, nonFerrousIn: 0.0907 },
  { gauge: 12, steelIn: 0.1046, galvanisedIn: 0.1084, stainlessIn: 0.1094, nonFerrousIn: 0.0808 },
  { gauge: 13, steelIn: 0.0897, galvanisedIn: 0.0934, stainlessIn: 0.0938, nonFerrousIn: 0.072 },
  { gauge: 14, steelIn: 0.0747, galvanisedIn: 0.0785, stainlessIn: 0.0781, nonFerrousIn: 0.0641 },
  { gauge: 15, steelIn: 0.0673, galvanisedIn: 0.071, stainlessIn: 0.0703, nonFerrousIn: 0.0571 },
  { gauge: 16, steelIn: 0.0598, galvanisedIn: 0.0635, stainlessIn: 0.0625, nonFerrousIn: 0.0508 },
  { gauge: 17, steelIn: 0.0538, galvanisedIn: 0.0575, stainlessIn: 0.0563, nonFerrousIn: 0.0453 },
  { gauge: 18, steelIn: 0.0478, galvanisedIn: 0.0516, stainlessIn: 0.05, nonFerrousIn: 0.0403 },
  { gauge: 19, steelIn: 0.0418, galvanisedIn: 0.0456, stainlessIn: 0.0438, nonFerrousIn: 0.0359 },
  { gauge: 20, steelIn: 0.0359, galvanisedIn: 0.0396, stainlessIn: 0.0375, nonFerrousIn: 0.032 },
  { gauge: 21, steelIn: 0.0329, galvanisedIn: 0.0366, stainlessIn: 0.0344, nonFerrousIn: 0.0285 },
  { gauge: 22, steelIn: 0.0299, galvanisedIn: 0.0336, stainlessIn: 0.0313, nonFerrousIn: 0.0253 },
  { gauge: 23, steelIn: 0.0269, galvanisedIn: 0.0306, stainlessIn: 0.0281, nonFerrousIn: 0.0226 },
  { gauge: 24, steelIn: 0.0239, galvanisedIn: 0.0276, stainlessIn: 0.025, nonFerrousIn: 0.0201 },
  { gauge: 25, steelIn: 0.0209, galvanisedIn: 0.0247, stainlessIn: 0.0219, nonFerrousIn: 0.0179 },
  { gauge: 26, steelIn: 0.0179, galvanisedIn: 0.0217, stainlessIn: 0.0188, nonFerrousIn: 0.0159 },
];

export const GAUGE_SOURCE: TableSource = {
  source: "sheet-metal gauge tables of Machinery's Handbook",
  confidence: 'published',
};

const FIELD: Readonly<Record<GaugeFamily, 'steelIn' | 'galvanisedIn' | 'stainlessIn' | 'nonFerrousIn'>> = {
  steel: 'steelIn',
  galvanised: 'galvanisedIn',
  stainless: 'stainlessIn',
  'non-ferrous': 'nonFerrousIn',
};

/**
 * Thickness of a gauge number in one family, mm, or null when that family has no such gauge.
 * @param gauge whole number as ordered (18 for "18 ga")
 */
export function gaugeThicknessMm(gauge: number, family: GaugeFamily): number | null {
  const inches = GAUGE_TABLE.find((row) => row.gauge === gauge)?.[FIELD[family]] ?? null;
  return inches === null ? null : inches * MM_PER_INCH;
}
