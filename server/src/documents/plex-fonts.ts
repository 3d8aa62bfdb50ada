import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { unpackWoff } from './unpack-woff';

/** The cuts of IBM Plex that documents use. */
export const PLEX = {
  sans: 'ibm-plex-sans-latin-400-normal',
  sansMedium: 'ibm-plex-sans-latin-500-normal',
  sansBold: 'ibm-plex-sans-latin-600-normal',
  mono: 'ibm-plex-mono-latin-400-normal',
  monoMedium: 'ibm-plex-mono-latin-500-normal',
  monoItalic: 'ibm-plex-mono-latin-500-italic',
} as const;
export type PlexFont = keyof typeof PLEX;

/** Walks up from this module, so that sources, tests and the bundle in `dist/` all find the one `fonts/` folder. */
function findFontsFolder(): string {
  for (let folder = __dirname; ; folder = path.dirname(folder)) {
    const candidate = path.join(folder, 'fonts');
    if (existsSync(path.join(candidate, 'ibm-plex-sans'))) return candidate;
    if (folder === path.dirname(folder)) throw new Error('The folder fonts/ with IBM Plex is missing');
  }
}

export type FontSubset = 'latin' | 'extended';

const unpacked = new Map<string, Buffer>();

/**
 * The font of a cut; `extended` is the subset with the Latin letters beyond Western Europe. From `.woff`, because the
 * PDF library writes empty glyphs from `.woff2`. Unpacked once a process.
 */
export function plexFont(font: PlexFont, subset: FontSubset): Buffer {
  const name = subset === 'latin' ? PLEX[font] : PLEX[font].replace('-latin-', '-latin-ext-');
  const known = unpacked.get(name);
  if (known) return known;
  const family = name.startsWith('ibm-plex-mono') ? 'ibm-plex-mono' : 'ibm-plex-sans';
  const bytes = unpackWoff(readFileSync(path.join(findFontsFolder(), family, `${name}.woff`)));
  unpacked.set(name, bytes);
  return bytes;
}

export interface FontRun {
  readonly subset: FontSubset;
  readonly text: string;
}

// What the Latin subset holds (its published unicode range, less what its files turn out to lack).
const IN_LATIN =
  /[\u0020-\u007e\u00a0-\u00ff\u0131\u0152\u0153\u02c6\u02da\u02dc\u2013\u2014\u2018-\u201a\u201c-\u201e\u2020-\u2022\u2026\u2030\u2039\u203a\u20ac\u2122\u2212]/;
const IN_EXTENDED = /[\u0100-\u0130\u0132-\u0151\u0154-\u017f\u0218-\u021b\u1e80-\u1e85\u1ef2\u1ef3]/;

/**
 * Splits text into runs by the font file that holds their glyphs. What neither holds is written as "?", never as an
 * empty box that could hide a digit.
 */
export function fontRuns(text: string): readonly FontRun[] {
  const runs: { subset: 'latin' | 'extended'; text: string }[] = [];
  for (const character of text.normalize('NFC')) {
    const subset = IN_EXTENDED.test(character) ? 'extended' : 'latin';
    const written = subset === 'extended' || IN_LATIN.test(character) ? character : '?';
    const last = runs.at(-1);
    if (last?.subset === subset) last.text += written;
    else runs.push({ subset, text: written });
  }
  return runs;
}
