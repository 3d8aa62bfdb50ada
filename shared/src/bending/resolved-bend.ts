import { bendAllowanceMm, isBendAngle, isReferenceAllowed, setbackMm } from './allowance';
import type { NeutralBend } from './allowance';
import { faceInBend, LARGEST_CARD_ANGLE_DEG, templateSetbackMm } from './card';
import type { CardTemplate } from './card';
import type { BendingStock, DevelopmentProblem, Provenance } from './development';
import { chooseKFactor } from './k-factor';
import type { BendDeclaration, LengthReference } from './layout';

/** A declared bend with everything about it settled for one stock. */
export interface ResolvedBend {
  readonly declaration: BendDeclaration;
  readonly name: string;
  readonly geometry: NeutralBend;
  readonly provenance: Provenance;
  readonly note: string | null;
  /** By how much K may be off, as its source says: about two standard deviations. */
  readonly kHalfWidth: number;
  readonly allowanceMm: number;
  /** Distance from the layout's bend line back to the tangent line, on both sides, mm. */
  readonly layoutSetbackMm: number;
  /** Reference the bend's deduction is stated to: the layout's own, or for templates the apex of the face that is held. */
  readonly reference: LengthReference;
}

export type ResolvedBendResult =
  { readonly ok: true; readonly bend: ResolvedBend } | { readonly ok: false; readonly problem: DevelopmentProblem };

/** A smaller turn is no bend: sheet is never flatter, and its zone would be narrower than points can be told apart. */
const LEAST_BEND_DEG = 0.1;

/**
 * Settles radius, K, allowance and setback of one bend.
 * @param template the card the layout was taken from; null when it was typed.
 */
export function resolveBend(
  declaration: BendDeclaration,
  name: string,
  template: CardTemplate | null,
  stock: BendingStock,
): ResolvedBendResult {
  const refuse = (code: DevelopmentProblem['code'], message: string): ResolvedBendResult => ({
    ok: false,
    problem: { code, message, ids: [declaration.id] },
  });
  const { bendAngleDeg } = declaration;
  if (!isBendAngle(bendAngleDeg) || bendAngleDeg < LEAST_BEND_DEG)
    return refuse(
      'angleOutOfRange',
      `Bend ${name} turns ${String(bendAngleDeg)}°; it must be at least ${String(LEAST_BEND_DEG)} and at most 180.`,
    );
  const insideRadiusMm = declaration.insideRadiusMm ?? stock.deliveredRadiusMm;
  if (!(insideRadiusMm >= 0) || !Number.isFinite(insideRadiusMm)) {
    return refuse(
      'radiusOutOfRange',
      `Bend ${name} has an inside radius of ${String(insideRadiusMm)} mm; it must be 0 or more.`,
    );
  }
  const form = { bendAngleDeg, insideRadiusMm, thicknessMm: stock.thicknessMm };
  const choice = chooseKFactor(form, declaration.override, stock);
  if (!choice.ok) return refuse(choice.code, `Bend ${name}: ${choice.message}`);
  const reading = readLengths(declaration, template);
  if (!reading.ok) return refuse('referenceNotAllowed', `Bend ${name}: ${reading.message}`);
  const geometry: NeutralBend = { ...form, kFactor: choice.kFactor };
  const layoutSetbackMm =
    reading.template === null
      ? setbackMm(form, reading.reference)
      : templateSetbackMm(form, declaration.direction, reading.template);
  return {
    ok: true,
    bend: {
      declaration,
      name,
      geometry,
      provenance: choice.provenance,
      note: choice.note,
      kHalfWidth: choice.halfWidth,
      allowanceMm: bendAllowanceMm(geometry),
      layoutSetbackMm,
      reference: reading.reference,
    },
  };
}

type Reading =
  | { readonly ok: true; readonly reference: LengthReference; readonly template: CardTemplate | null }
  | { readonly ok: false; readonly message: string };

function readLengths(declaration: BendDeclaration, template: CardTemplate | null): Reading {
  const { lengths, bendAngleDeg, direction } = declaration;
  if (lengths.from === 'reference') {
    if (isReferenceAllowed(lengths.reference, bendAngleDeg))
      return { ok: true, reference: lengths.reference, template: null };
    return { ok: false, message: 'a hem has no apex to measure to. State its lengths to the tangent.' };
  }
  if (template === null) return { ok: false, message: 'its lengths are read from a template, but the part has none.' };
  if (!(template.thicknessMm > 0) || !Number.isFinite(template.thicknessMm)) {
    return { ok: false, message: `a template ${String(template.thicknessMm)} mm thick cannot be read.` };
  }
  const reading = lengths.override ?? template.reading;
  if (
    reading.hinge.kind === 'depth' &&
    !(reading.hinge.depthMm >= 0 && reading.hinge.depthMm <= template.thicknessMm)
  ) {
    return { ok: false, message: `the card can't hinge at a depth of ${String(reading.hinge.depthMm)} mm.` };
  }
  if (bendAngleDeg > LARGEST_CARD_ANGLE_DEG) {
    const message = `lengths read off a template hold up to ${String(LARGEST_CARD_ANGLE_DEG)}°. State a tangent reference for this bend.`;
    return { ok: false, message };
  }
  const held = faceInBend(reading.bearingFace, direction);
  return {
    ok: true,
    reference: held === 'inside' ? 'insideApex' : 'outsideApex',
    template: { thicknessMm: template.thicknessMm, reading },
  };
}
