import fs from 'node:fs';
import path from 'node:path';
import type { z } from 'zod';

/**
 * State of a stand-in in one JSON file. Each save replaces the file whole, so that a process killed in the middle of a
 * save leaves the state before it.
 */
export class StateFile<S extends z.ZodType> {
  private readonly file: string;

  constructor(
    directory: string,
    private readonly schema: S,
    private readonly empty: z.output<S>,
  ) {
    fs.mkdirSync(directory, { recursive: true });
    this.file = path.join(directory, 'state.json');
  }

  /** What was saved last, or the empty state when nothing was yet. */
  load(): z.output<S> {
    if (!fs.existsSync(this.file)) return structuredClone(this.empty);
    return this.schema.parse(JSON.parse(fs.readFileSync(this.file, 'utf8')));
  }

  save(state: z.output<S>): void {
    const draft = `${this.file}.new`;
    fs.writeFileSync(draft, JSON.stringify(state));
    fs.renameSync(draft, this.file);
  }
}
