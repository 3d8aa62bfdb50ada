import type { BendDeclaration } from '../bending/layout';
import type { BendRow } from '../bending/development';
import { between, directionDeg, subtract } from '../geometry/vector';
import type { SheetStock } from '../part/part-document';
import type { SheetMaterial } from '../stock/material';
import { findMaterial } from '../stock/materials';
import { formatDecimal } from '../units/length';
import type { Finding, Severity } from './finding';
import { ALONG_GRAIN, LIMIT_SLACK_MM, NOMINAL_THICKNESS_SLACK, ruleFrom } from './limits';
import { mendThatHolds } from './mend-that-holds';
import { type RuleContext, nameOf, placeOfLayout } from './rule-context';

/**
 * Inside radius against the material's minimum for its thickness. Along the grain (within 45°) or with the grain unknown
 * the radius has to be half as large again. Below what the sheet stands at all, or below the table for a temper that
 * cracks: a blocker. Below the table: a caution. Enough across the grain only: a hint (a caution for such a temper).
 */
export function checkRadiusBelowMinimum(context: RuleContext): readonly Finding[] {
  const { development, material, document } = context;
  if (development === null || material === null) return [];
  return development.bendTable.flatMap((row) => {
    const bend = document.layout.bends.find(({ id }) => id === row.bendId);
    return bend === undefined ? [] : checkBend(context, material, row, bend);
  });
}

function checkBend(
  context: RuleContext,
  material: SheetMaterial,
  row: BendRow,
  bend: BendDeclaration,
): readonly Finding[] {
  const thicknessMm = context.sheet.thicknessMm;
  const { minimumRadius } = material;
  const acrossMm = acrossGrainMm(material, thicknessMm);
  const grain = grainOf(context.sheet.grainDirectionDeg, bend);
  const requiredMm = grain === 'across' ? acrossMm : acrossMm * ALONG_GRAIN.factor;
  const absoluteMm = (minimumRadius.absoluteOverT ?? 0) * thicknessMm;
  const radiusMm = row.insideRadiusMm;
  const isBelow = (limitMm: number) => radiusMm < limitMm - LIMIT_SLACK_MM;
  if (!isBelow(requiredMm)) return [];
  const severity: Severity = isBelow(absoluteMm)
    ? 'blocker'
    : isBelow(acrossMm)
      ? minimumRadius.refuseBelow
        ? 'blocker'
        : 'caution'
      : minimumRadius.refuseBelow
        ? 'caution'
        : 'hint';
  const id = `radiusBelowMinimum-${row.bendId}`;
  const name = nameOf(context, row.bendId);
  const times = (valueMm: number) => `${formatDecimal(valueMm / thicknessMm, 2)} T`;
  const setMm = Math.ceil(requiredMm * 100 - LIMIT_SLACK_MM) / 100;
  const { from, to } = bend.line;
  return [
    {
      id,
      rule: 'radiusBelowMinimum',
      severity,
      title:
        severity === 'hint'
          ? `${name} is tight for a bend ${grain === 'along' ? 'along the grain' : 'whose grain is unknown'}`
          : `${name} is bent tighter than ${material.shortName} likes`,
      detail:
        `Its inside radius is ${formatDecimal(radiusMm, 2)} mm (${times(radiusMm)}). At ${formatDecimal(thicknessMm, 2)} mm ` +
        `thick, ${material.shortName} wants ${formatDecimal(acrossMm, 2)} across the grain` +
        (grain === 'across'
          ? '.'
          : ` and ${formatDecimal(requiredMm, 2)} along it${grain === 'along' ? ', as here.' : '; the grain is unknown.'}`),
      foundMm: radiusMm,
      requiredMm,
      why: ruleFrom(
        grain === 'across' ? 'smallest inside radius' : 'smallest inside radius, half as much again along the grain',
        minimumRadius,
      ),
      ids: [row.bendId],
      at: placeOfLayout(context, between(from, to, 0.5)),
      advice:
        grain === 'across'
          ? `Bend it over a radius of ${formatDecimal(setMm, 2)} mm or more, or take a softer sheet.`
          : `Bend it over ${formatDecimal(setMm, 2)} mm or more, or lay the part so that the grain crosses this bend.`,
      mend: mendThatHolds(context, id, `Set the radius to ${formatDecimal(setMm, 2)} mm`, [
        { kind: 'changeBend', bendId: bend.id, bend: { ...bend, insideRadiusMm: setMm } },
      ]),
    },
  ];
}

/** Smallest inside radius across the grain that the material's table wants for a thickness, mm. */
function acrossGrainMm({ minimumRadius: { rows } }: SheetMaterial, thicknessMm: number): number {
  const row = rows.find(({ upToThicknessMm }) => thicknessMm <= upToThicknessMm * NOMINAL_THICKNESS_SLACK);
  return ((row ?? rows[rows.length - 1])?.recommendedOverT ?? 0) * thicknessMm;
}

/**
 * Whether a sheet stands a bend of this radius; true where the tables know no material. Bends that run along the grain have to
 * be rounder; where the grain is unknown the part can still be laid across it.
 */
export function standsRadius(sheet: SheetStock, bend: BendDeclaration, radiusMm: number): boolean {
  const material = findMaterial(sheet.materialId);
  if (material === null) return true;
  const acrossMm = acrossGrainMm(material, sheet.thicknessMm);
  const isAlong = grainOf(sheet.grainDirectionDeg, bend) === 'along';
  return radiusMm >= acrossMm * (isAlong ? ALONG_GRAIN.factor : 1) - LIMIT_SLACK_MM;
}

/** How a bend lies to the rolling direction: within 45° of it counts as along. */
function grainOf(grainDirectionDeg: number | null, bend: BendDeclaration): 'across' | 'along' | 'unknown' {
  if (grainDirectionDeg === null) return 'unknown';
  const betweenDeg = Math.abs(directionDeg(subtract(bend.line.to, bend.line.from)) - grainDirectionDeg) % 180;
  const angleDeg = Math.min(betweenDeg, 180 - betweenDeg);
  return angleDeg >= ALONG_GRAIN.acrossFromDeg - LIMIT_SLACK_MM ? 'across' : 'along';
}
