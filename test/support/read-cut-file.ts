import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import * as z from 'zod/mini';

const READER = path.join(__dirname, 'read_dxf.py');

/** What read_dxf.py prints, as far as journeys ask. */
const cutFileSchema = z.object({
  errors: z.array(z.string()),
  entities: z.array(
    z.object({
      layer: z.string(),
      extents: z.optional(z.tuple([z.number(), z.number(), z.number(), z.number()])),
    }),
  ),
});

/** A cut file read by a library that is not ours: what its audit complains of, its layers, and the blank's size, mm. */
export interface ReadCutFile {
  readonly errors: readonly string[];
  readonly layers: readonly string[];
  readonly blank: { readonly widthMm: number; readonly heightMm: number };
}

export function readCutFile(bytes: Buffer): ReadCutFile {
  const folder = mkdtempSync(path.join(os.tmpdir(), 'cut-file-'));
  try {
    const file = path.join(folder, 'part.dxf');
    writeFileSync(file, bytes);
    const said = execFileSync('/usr/bin/python3', [READER, file], { encoding: 'utf8', timeout: 60_000 });
    const { errors, entities } = cutFileSchema.parse(JSON.parse(said));
    const outline = entities.find(({ layer }) => layer === 'OUTLINE')?.extents;
    if (outline === undefined) throw new Error('The cut file has no outline.');
    const [left, bottom, right, top] = outline;
    const layers = [...new Set(entities.map(({ layer }) => layer))].sort();
    return { errors, layers, blank: { widthMm: right - left, heightMm: top - bottom } };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
