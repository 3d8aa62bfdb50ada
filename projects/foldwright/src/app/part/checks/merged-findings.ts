import type { StockRole } from '@foldwright/shared/part/part-document';
import type { Finding, Severity } from '@foldwright/shared/rules/finding';

/** A finding with the sheets it holds for: the same one is told once. */
export interface MergedFinding {
  readonly finding: Finding;
  readonly roles: readonly StockRole[];
}

const RANK: Readonly<Record<Severity, number>> = { blocker: 0, caution: 1, hint: 2 };

/**
 * Findings of both sheets in one list, worst first. One that both sheets share is taken from the sheet where it is worse,
 * production before trial.
 */
export function mergeFindings(trial: readonly Finding[], production: readonly Finding[]): readonly MergedFinding[] {
  const merged = new Map<string, MergedFinding>();
  for (const [role, findings] of [['production', production] as const, ['trial', trial] as const]) {
    for (const finding of findings) {
      const known = merged.get(finding.id);
      if (known === undefined) {
        merged.set(finding.id, { finding, roles: [role] });
      } else {
        const isWorse = RANK[finding.severity] < RANK[known.finding.severity];
        merged.set(finding.id, { finding: isWorse ? finding : known.finding, roles: [...known.roles, role] });
      }
    }
  }
  return [...merged.values()].sort((a, b) => RANK[a.finding.severity] - RANK[b.finding.severity]);
}

/** Which sheet a finding is about, in words. */
export function sheetWords({ roles }: MergedFinding, labels: Readonly<Record<StockRole, string>>): string {
  return roles.length === 2 ? 'in both sheets' : roles.map((role) => `in ${labels[role]}`).join('');
}
