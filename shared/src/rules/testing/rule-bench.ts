import type { BendDeclaration, Feature, HolePurpose } from '../../bending/layout';
import { applyCommands } from '../../part/apply-command';
import type { PartCommand } from '../../part/commands';
import type { PartDocument, SheetStock } from '../../part/part-document';
import { starterDocument } from '../../part/starter-document';
import { checkPart } from '../check-part';
import type { Finding, RuleId } from '../finding';

/** 2 mm steel whose grain runs along x, bent over a V 16. */
export const ACROSS: SheetStock = { materialId: 'dc01', thicknessMm: 2, grainDirectionDeg: 0, vOpeningMm: 16 };

/** An L of 60 + 40, 50 wide, bent across the grain with R 2.6; nothing is wrong with it. */
export function bracket(stock: Partial<SheetStock> = {}, bend: Partial<BendDeclaration> = {}): PartDocument {
  const start = starterDocument({ shape: 'l-bracket', baseMm: 60, flangeMm: 40, widthMm: 50, bendAngleDeg: 90 });
  const [declared] = start.layout.bends;
  if (declared === undefined) throw new Error('an L has a bend');
  return applyCommands(start, [
    { kind: 'setStock', role: 'production', stock: { ...ACROSS, ...stock } },
    { kind: 'changeBend', bendId: 'b1', bend: { ...declared, insideRadiusMm: 2.6, ...bend } },
  ]);
}

/** A flat plate in the same sheet. */
export function plate(widthMm: number, heightMm: number): PartDocument {
  const start = starterDocument({ shape: 'flat-plate', widthMm, heightMm });
  return applyCommands(start, [{ kind: 'setStock', role: 'production', stock: ACROSS }]);
}

/** A hole for a test. */
export function hole(id: string, x: number, y: number, purpose: HolePurpose): Feature {
  return { kind: 'hole', id, centre: { x, y }, purpose };
}

/** A hole that is nothing but a diameter. */
export function plain(diameterMm: number): HolePurpose {
  return { kind: 'plain', diameterMm };
}

/** The document with more holes and slots. */
export function add(document: PartDocument, ...features: readonly Feature[]): PartDocument {
  return applyCommands(
    document,
    features.map((feature): PartCommand => ({ kind: 'addFeature', feature })),
  );
}

/** What one rule finds in the production sheet. */
export function found(document: PartDocument, rule: RuleId): readonly Finding[] {
  return checkPart(document, 'production').filter((finding) => finding.rule === rule);
}

/** How grave what one rule finds is. */
export function severities(document: PartDocument, rule: RuleId): readonly string[] {
  return found(document, rule).map(({ severity }) => severity);
}

/** What is left of a single finding when its mend holds. */
export const MENDED = { before: 1, left: 0, newBlockers: 0 } as const;

/** What applying all mends of a rule leads to: how often the rule speaks before and after, blockers of all rules likewise. */
export function outcomeOfMending(document: PartDocument, rule: RuleId) {
  const blockers = (of: PartDocument) =>
    checkPart(of, 'production').filter(({ severity }) => severity === 'blocker').length;
  const after = mended(document, rule);
  return {
    before: found(document, rule).length,
    left: found(after, rule).length,
    newBlockers: Math.max(0, blockers(after) - blockers(document)),
  };
}

/** A layout drawn anew: corners of the outline joined by straight edges named "t0", "t1", ... */
export function outlined(document: PartDocument, corners: readonly (readonly [number, number])[]): PartDocument {
  const edges = corners.map(([x, y], index) => ({ id: `t${String(index)}`, start: { x, y }, bulge: 0 }));
  return applyCommands(document, [
    { kind: 'replaceLayout', origin: 'import', layout: { ...document.layout, outer: { id: 'outer', edges } } },
  ]);
}

/** A cut-out with straight edges named after it. */
export function cutout(id: string, corners: readonly (readonly [number, number])[]): PartCommand {
  const edges = corners.map(([x, y], index) => ({ id: `${id}${String(index)}`, start: { x, y }, bulge: 0 }));
  return { kind: 'addCutout', loop: { id, edges } };
}

/** Applies mends of a rule until it offers none. @throws Error when that does not come to an end */
function mended(document: PartDocument, rule: RuleId): PartDocument {
  let current = document;
  for (let round = 0; round < 6; round += 1) {
    const mend = found(current, rule).find((finding) => finding.mend !== null)?.mend;
    if (mend == null) return current;
    current = applyCommands(current, mend.commands);
  }
  throw new Error(`mending ${rule} does not come to an end`);
}
