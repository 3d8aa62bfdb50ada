import { partDocumentSchema } from '../../contracts/part-document-schema';
import { checkInvariants } from '../invariants';
import type { PartDocument } from '../part-document';
import v1 from './fixtures/v1.json';
import { CURRENT_SCHEMA_VERSION, DOCUMENT_UPGRADES, upgradeDocument } from './upgrade-document';

describe('upgradeDocument', () => {
  it('reads the frozen document of version 1', () => {
    const result = upgradeDocument(v1);
    expect(result.ok).toBe(true);
    const document: PartDocument = partDocumentSchema.parse(result.ok && result.document);
    expect(checkInvariants(document)).toEqual([]);
    expect(document).toEqual(v1);
  });

  it('has one step from every older version', () => {
    expect(DOCUMENT_UPGRADES.map(({ fromVersion }) => fromVersion)).toEqual(
      Array.from({ length: CURRENT_SCHEMA_VERSION - 1 }, (_, index) => index + 1),
    );
  });

  it('goes through the chain step by step', () => {
    const chain = [
      { fromVersion: 1, upgrade: (old: Readonly<Record<string, unknown>>) => ({ ...old, trail: ['one'] }) },
      { fromVersion: 2, upgrade: (old: Readonly<Record<string, unknown>>) => ({ ...old, second: true }) },
    ];
    expect(upgradeDocument({ schemaVersion: 1 }, chain, 3)).toEqual({
      ok: true,
      document: { schemaVersion: 3, trail: ['one'], second: true },
    });
    expect(upgradeDocument({ schemaVersion: 2 }, chain, 3)).toEqual({
      ok: true,
      document: { schemaVersion: 3, second: true },
    });
  });

  it.each([
    ['nothing', null],
    ['a list', []],
    ['a document without a version', {}],
    ['a document from the future', { schemaVersion: 2 }],
    ['a version that is no whole number', { schemaVersion: 1.5 }],
  ])('refuses %s with a reason', (_, stored) => {
    expect(upgradeDocument(stored)).toMatchObject({ ok: false });
  });
});
