import { writeFile } from 'node:fs/promises';
import { checkPart } from '@foldwright/shared/rules/check-part';
import type { DocumentInput } from '../../documents/document-input';
import { makeDxf } from '../../documents/dxf';
import { makeFullSizePrint } from '../../documents/full-size-print';
import { makeDrawing } from '../../documents/part-drawing';
import { BadInput, type CommandOutput, runCommand } from '../command';
import { developOrBadInput, readPartArguments } from '../part-file';

async function write(fileName: string, bytes: Buffer): Promise<void> {
  await writeFile(fileName, bytes).catch(() => {
    throw new BadInput(`${fileName} can’t be written`);
  });
}

/**
 * `export PART.json [--dxf FILE] [--pdf FILE] [--print FILE] [--paper A4|Letter] [--stock trial|production]`: the same
 * documents that a release makes, marked as a draft.
 */
export function runExport(argv: readonly string[], io: CommandOutput): Promise<number> {
  return runCommand('export', io, async () => {
    const { file, options } = await readPartArguments(argv, ['dxf', 'pdf', 'print', 'paper']);
    const { dxf, pdf, print, paper = 'A4' } = options;
    if (dxf === undefined && pdf === undefined && print === undefined) {
      throw new BadInput('say what to write: --dxf FILE, --pdf FILE, --print FILE');
    }
    if (paper !== 'A4' && paper !== 'Letter') throw new BadInput(`--paper is A4 or Letter, not ${paper}`);
    const input: DocumentInput = {
      partName: file.name,
      partNumber: file.name,
      revisionLetter: 'A',
      isDraft: true,
      hash: null,
      releasedAt: null,
      releasedBy: null,
      workshopName: '',
      role: file.role,
      document: file.document,
      development: developOrBadInput(file),
      findings: checkPart(file.document, file.role),
      statement: file.document.making.statement,
    };
    if (dxf !== undefined) await write(dxf, await makeDxf(input));
    if (pdf !== undefined) await write(pdf, await makeDrawing(input));
    if (print !== undefined) await write(print, await makeFullSizePrint(input, { paper }));
  });
}
