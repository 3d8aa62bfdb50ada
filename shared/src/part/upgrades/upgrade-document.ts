/** Turns a stored document of one version into the next one. Pure; the value has passed nothing but its version. */
export interface DocumentUpgrade {
  readonly fromVersion: number;
  readonly upgrade: (document: Readonly<Record<string, unknown>>) => Readonly<Record<string, unknown>>;
}

/** Version that this code reads and writes. */
export const CURRENT_SCHEMA_VERSION = 1;

/**
 * One file per old version, in rising order; each has a frozen fixture beside it. Empty while version 1 is the first.
 */
export const DOCUMENT_UPGRADES: readonly DocumentUpgrade[] = [];

/** A value of the current version, still to be parsed by the contract's schema, or why it cannot be read. */
export type UpgradeResult =
  | { readonly ok: true; readonly document: Readonly<Record<string, unknown>> }
  | { readonly ok: false; readonly reason: string };

/**
 * Brings a stored document of any known version up to the current one, step by step.
 * @param stored what was read, of unknown shape
 * @param upgrades the chain; callers leave it at the default, tests bring their own
 * @param currentVersion version the chain leads to
 */
export function upgradeDocument(
  stored: unknown,
  upgrades: readonly DocumentUpgrade[] = DOCUMENT_UPGRADES,
  currentVersion: number = CURRENT_SCHEMA_VERSION,
): UpgradeResult {
  if (!isRecord(stored)) return { ok: false, reason: 'This is not a part document: it is no JSON object.' };
  let document: Readonly<Record<string, unknown>> = stored;
  let version = versionOf(document);
  if (version === null) return { ok: false, reason: 'This is not a part document: it names no schemaVersion.' };
  if (version > currentVersion) {
    return {
      ok: false,
      reason: `This document is of version ${version}; this installation reads up to ${currentVersion}.`,
    };
  }
  while (version < currentVersion) {
    const step = upgrades.find((candidate) => candidate.fromVersion === version);
    if (step === undefined) return { ok: false, reason: `Documents of version ${version} are not known here.` };
    document = { ...step.upgrade(document), schemaVersion: version + 1 };
    version += 1;
  }
  return { ok: true, document };
}

function isRecord(value: unknown): value is Readonly<Record<string, unknown>> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function versionOf(document: Readonly<Record<string, unknown>>): number | null {
  const version = document['schemaVersion'];
  return typeof version === 'number' && Number.isInteger(version) && version >= 1 ? version : null;
}
