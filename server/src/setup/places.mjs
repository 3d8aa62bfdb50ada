// Where things lie. Plain Node: everything in this folder runs before any package is installed.
import fs from 'node:fs';
import path from 'node:path';

/** The folder of the checkout. */
export const ROOT = path.resolve(import.meta.dirname, '../../..');

/** The folder for what belongs to this checkout but not into the repository: database, files, logs, secrets. */
export function dataDirectory(env = process.env) {
  return path.resolve(ROOT, env.FOLDWRIGHT_DATA_DIR || '.data');
}

/** Make a folder that every account may enter (the database runs under its own) and return its path. */
export function ensureDirectory(directory, mode = 0o755) {
  fs.mkdirSync(directory, { recursive: true, mode });
  return directory;
}

/** The content of a JSON file, or undefined when there is none or it is torn. */
export function readJson(file) {
  try {
    return JSON.parse(fs.readFileSync(file, 'utf8'));
  } catch {
    // A missing or half-written file is the same to every caller: it is made anew.
    return undefined;
  }
}

/** Write a JSON file so that a reader sees the old content or the new, never half of one. */
export function writeJson(file, value, mode = 0o644) {
  const draft = `${file}.${process.pid}`;
  fs.writeFileSync(draft, `${JSON.stringify(value, null, 2)}\n`, { mode });
  fs.renameSync(draft, file);
}
