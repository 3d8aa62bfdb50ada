import { checkPart } from '@foldwright/shared/rules/check-part';
import { type CommandOutput, runCommand } from '../command';
import { readPartArguments } from '../part-file';

/** `check PART.json [--stock trial|production]`: the findings as JSON, worst first. Findings are no error: exit code 0. */
export function runCheck(argv: readonly string[], io: CommandOutput): Promise<number> {
  return runCommand('check', io, async () => {
    const { file } = await readPartArguments(argv);
    io.stdout(`${JSON.stringify({ role: file.role, findings: checkPart(file.document, file.role) }, null, 2)}\n`);
  });
}
