import * as fc from 'fast-check';
import { applyCommands } from '@foldwright/shared/part/apply-command';
import { canonicalJson } from '@foldwright/shared/part/canonical-json';
import type { StockRole } from '@foldwright/shared/part/part-document';
import { anyCommand, furnishedBracket, tryApply } from '../support/any-command';
import { checkPart } from '@foldwright/shared/rules/check-part';

/** Parts as people leave them half way: corners pulled through each other, bends off the sheet, holes over the edge. */
const anyPart = fc.array(anyCommand, { maxLength: 10 }).map((commands) => commands.reduce(tryApply, furnishedBracket));
const role = fc.constantFrom<StockRole>('trial', 'production');

describe('checks of any part', () => {
  it('answer with findings that say what, why and what to do, never with an exception or a NaN', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        const findings = checkPart(document, stock);
        // Canonical JSON refuses NaN and infinities.
        expect(canonicalJson(findings).length).toBeGreaterThan(1);
        for (const { title, detail, advice, why } of findings) {
          for (const words of [title, detail, advice, why.text, why.source]) expect(words).toMatch(/^\S.*\S$/su);
        }
        const ids = findings.map(({ id }) => id);
        expect(new Set(ids).size).toBe(ids.length);
      }),
      { numRuns: 50 },
    );
  });

  it('offer only mends that can be applied and take their finding away', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        for (const { id, mend } of checkPart(document, stock)) {
          if (mend === null) continue;
          const left = checkPart(applyCommands(document, mend.commands), stock);
          expect(left.map((finding) => finding.id)).not.toContain(id);
        }
      }),
      { numRuns: 30 },
    );
  });

  it('answer the same for the same part', () => {
    fc.assert(
      fc.property(anyPart, role, (document, stock) => {
        expect(checkPart(document, stock)).toEqual(checkPart(document, stock));
      }),
      { numRuns: 10 },
    );
  });
});
