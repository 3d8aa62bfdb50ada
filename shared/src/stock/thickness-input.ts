import { gaugeThicknessMm } from './gauges';
import type { SheetMaterial } from './material';
import { type LengthReading, parseLength } from '../units/length';

const GAUGE = /^#?\s*(\d{1,2})\s*(?:ga|gauge|gage|g)\.?$/i;

/**
 * Reads a typed sheet thickness: any length, or a gauge ("18 ga") of the material's family, which is frozen to mm at
 * once, because the number alone means four thicknesses.
 * @param text what was typed
 * @param material the material the sheet is of
 * @returns thickness in mm, or a sentence why not
 */
export function parseThickness(text: string, material: SheetMaterial): LengthReading {
  const gauge = GAUGE.exec(text.trim())?.[1];
  if (gauge === undefined) {
    const reading = parseLength(text);
    if (reading.ok && reading.valueMm <= 0) return { ok: false, reason: 'A thickness is more than 0.' };
    return reading;
  }
  if (material.gaugeFamily === null) {
    return { ok: false, reason: `${material.name} is not sold by gauge; give the thickness in mm or inches.` };
  }
  const valueMm = gaugeThicknessMm(Number(gauge), material.gaugeFamily);
  if (valueMm === null)
    return { ok: false, reason: `${material.name} has no gauge ${gauge}; the table runs from 7 to 26.` };
  return { ok: true, valueMm, unit: 'in' };
}
