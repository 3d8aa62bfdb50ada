import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import * as z from 'zod';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { developPart } from '@foldwright/shared/part/develop-part';
import { checkInvariants } from '@foldwright/shared/part/invariants';
import { checkPart } from '@foldwright/shared/rules/check-part';
import { layOutMesh, poseFormed } from '@foldwright/shared/bending/formed-mesh';
import { meshFacts } from '@foldwright/shared/bending/testing/mesh-facts';

const root = join(__dirname, '../..');
const fixtures = join(root, 'test/fixtures/parts');
const expectationSchema = z.strictObject({
  document: z.string(),
  stock: z.enum(['trial', 'production']),
  blankMm: z.tuple([z.number(), z.number()]),
  formedBoxMm: z.tuple([z.number(), z.number(), z.number()]),
  how: z.array(z.string()).min(1),
  findings: z.array(z.string()),
});
const expectations = readdirSync(fixtures).filter((name) => name.endsWith('.expected.json'));

const readJson = (path: string): unknown => JSON.parse(readFileSync(path, 'utf8'));

describe('parts with sizes worked out by hand', () => {
  it('are all there', () => {
    expect(expectations.length).toBeGreaterThanOrEqual(6);
  });

  it.each(expectations)('%s', (name) => {
    const expected = expectationSchema.parse(readJson(join(fixtures, name)));
    const document = partDocumentSchema.parse(readJson(join(root, expected.document)));
    expect(checkInvariants(document)).toEqual([]);
    const result = developPart(document, expected.stock);
    if (!result.ok) throw new Error(result.problems.map(({ message }) => message).join('; '));
    const { flat, formedBox } = result.development;
    expect(flat.bounds.max.x - flat.bounds.min.x).toBeCloseTo(expected.blankMm[0], 3);
    expect(flat.bounds.max.y - flat.bounds.min.y).toBeCloseTo(expected.blankMm[1], 3);
    (['x', 'y', 'z'] as const).forEach((axis, index) => {
      expect(formedBox.max[axis] - formedBox.min[axis]).toBeCloseTo(expected.formedBoxMm[index] ?? 0, 3);
    });
    expect(checkPart(document, expected.stock).map(({ rule }) => rule)).toEqual(expected.findings);
    expect(meshFacts(poseFormed(layOutMesh(result.development, 0.1), 1))).toMatchObject({
      openEdges: 0,
      isFinite: true,
    });
    // The other sheet has to work too: a trial that cannot be bent would be no trial.
    expect(developPart(document, 'trial').ok).toBe(true);
  });
});
