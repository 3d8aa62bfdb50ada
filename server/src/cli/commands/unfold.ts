import { type CommandOutput, runCommand } from '../command';
import { developOrBadInput, readPartArguments } from '../part-file';

/** `unfold PART.json [--stock trial|production]`: flat pattern, bend table and formed bounding box as JSON, mm and degrees. */
export function runUnfold(argv: readonly string[], io: CommandOutput): Promise<number> {
  return runCommand('unfold', io, async () => {
    const { file } = await readPartArguments(argv);
    const { stock, flat, bendTable, formedBox, formedSizes } = developOrBadInput(file);
    const answer = { units: 'mm', role: file.role, stock, flat, bendTable, formedBox, formedSizes };
    io.stdout(`${JSON.stringify(answer, null, 2)}\n`);
  });
}
