import { writeFile } from 'node:fs/promises';
import { parseArgs } from 'node:util';
import { makeScaleSheet } from '../../documents/scale-sheet/scale-sheet';
import type { CommandOutput } from './trace';

const USAGE = 'usage: scale-sheet --size A4|Letter --variant light|dark --out FILE.pdf';

/** `scale-sheet`: writes the printable scale sheet. Resolves to the exit code: 0, or 2 with one line that says why. */
export async function runScaleSheet(argv: readonly string[], io: CommandOutput): Promise<number> {
  try {
    const { values } = parseArgs({
      args: [...argv],
      options: {
        size: { type: 'string', default: 'A4' },
        variant: { type: 'string', default: 'light' },
        out: { type: 'string' },
      },
    });
    const { size, variant, out } = values;
    if (size !== 'A4' && size !== 'Letter') throw new Error(`--size must be A4 or Letter, not ${size}`);
    if (variant !== 'light' && variant !== 'dark') throw new Error(`--variant must be light or dark, not ${variant}`);
    if (out === undefined) throw new Error('--out is missing');
    await writeFile(out, await makeScaleSheet({ size, variant }));
    return 0;
  } catch (error) {
    const reason = error instanceof Error ? error.message.split('\n')[0] : String(error);
    io.stderr(`scale-sheet: ${reason} (${USAGE})\n`);
    return 2;
  }
}
