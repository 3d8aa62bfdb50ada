import type { Figure, TableSource } from '@foldwright/shared/stock/figure';
import type { KBand, SheetMaterial } from '@foldwright/shared/stock/material';
import { stockThicknessesMm } from '@foldwright/shared/stock/stock-thicknesses';
import { formatDecimal } from '@foldwright/shared/units/length';
import { formatPercent } from '@foldwright/shared/units/quantity';

/** One value of a material with where it comes from. */
export interface MaterialFigure extends TableSource {
  readonly label: string;
  readonly value: string;
}

/** Every tabled value of a sheet material, each with its source. */
export function figuresOf(material: SheetMaterial): readonly MaterialFigure[] {
  return [
    figure('Density', material.densityKgPerM3, 'kg/m³'),
    figure('Elastic modulus', material.elasticModulusGpa, 'GPa'),
    ...(material.yieldMpa === null ? [] : [figure('Yield strength', material.yieldMpa, 'MPa')]),
    figure('Tensile strength, highest to expect', material.ultimateMpa, 'MPa'),
    smallestRadius(material),
    {
      label: 'Inside radius of an air bend',
      value: `${formatPercent(material.deliveredRadiusShare.value)} of the V opening`,
      source: material.deliveredRadiusShare.source,
      confidence: material.deliveredRadiusShare.confidence,
    },
    {
      label: 'K, the trade’s band by R/T',
      value: `${band(material.kBands.belowOne)} below 1, ${band(material.kBands.oneToThree)} to 3, ${band(material.kBands.aboveThree)} above`,
      source: material.kBands.source,
      confidence: material.kBands.confidence,
    },
    ...(material.handbookK === null
      ? []
      : [
          {
            label: 'K by handbook',
            value: formatDecimal(material.handbookK.kFactor, 3),
            source: material.handbookK.source,
            confidence: material.handbookK.confidence,
          },
        ]),
  ];
}

/** Where K is taken from while nobody has measured it, in words. */
export function kFromWords(material: SheetMaterial): string {
  switch (material.kFrom) {
    case 'din6935':
      return 'K is taken from DIN 6935 until the shop has bent its own strips.';
    case 'handbook':
      return 'K is taken from the handbook until the shop has bent its own strips.';
    case 'band':
      return 'K is taken from the middle of the trade’s band until the shop has bent its own strips.';
  }
}

/** Thicknesses it is usually sold in, mm; empty when the tables list none. */
export function soldIn(material: SheetMaterial): string {
  const written = stockThicknessesMm(material.id).map((thicknessMm) => formatDecimal(thicknessMm, 2));
  // An inch size and a metric one can read the same.
  return [...new Set(written)].join(', ');
}

function figure(label: string, { value, source, confidence }: Figure, unit: string): MaterialFigure {
  return { label, value: `${formatDecimal(value, 1)} ${unit}`, source, confidence };
}

function smallestRadius({ minimumRadius }: SheetMaterial): MaterialFigure {
  const rows = minimumRadius.rows.map(({ upToThicknessMm, recommendedOverT }, index, all) =>
    all.length === 1 || !Number.isFinite(upToThicknessMm) || index === all.length - 1
      ? `${formatDecimal(recommendedOverT, 2)} T${all.length > 1 ? ' above' : ''}`
      : `${formatDecimal(recommendedOverT, 2)} T up to ${formatDecimal(upToThicknessMm, 2)}`,
  );
  const limit =
    minimumRadius.absoluteOverT === null ? '' : `; cracks below ${formatDecimal(minimumRadius.absoluteOverT, 2)} T`;
  return {
    label: 'Smallest inside radius',
    value: `${rows.join(', ')}${limit}`,
    source: minimumRadius.source,
    confidence: minimumRadius.confidence,
  };
}

function band({ low, high }: KBand): string {
  return `${formatDecimal(low, 3)} to ${formatDecimal(high, 3)}`;
}
