import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { parseArgs, type ParseArgsConfig } from 'node:util';
import type { Development } from '@foldwright/shared/bending/development';
import { partDocumentSchema } from '@foldwright/shared/contracts/part-document-schema';
import { developPart } from '@foldwright/shared/part/develop-part';
import { checkInvariants } from '@foldwright/shared/part/invariants';
import type { PartDocument, StockRole } from '@foldwright/shared/part/part-document';
import { BadInput } from './command';

/** A part document this large is no bracket; reading it whole would only waste memory. */
const LARGEST_FILE_BYTES = 8_000_000;

export interface PartFile {
  readonly name: string;
  readonly document: PartDocument;
  readonly role: StockRole;
}

export interface PartArguments {
  readonly file: PartFile;
  readonly options: Readonly<Record<string, string | undefined>>;
}

/**
 * Reads `PART.json [--stock trial|production] [options]`.
 * @throws BadInput for a missing file, a file that is no part document, or an option nobody knows.
 */
export async function readPartArguments(
  argv: readonly string[],
  options: readonly string[] = [],
): Promise<PartArguments> {
  const config = {
    args: [...argv],
    allowPositionals: true,
    options: Object.fromEntries(['stock', ...options].map((option) => [option, { type: 'string' as const }])),
  } satisfies ParseArgsConfig;
  const parsed = parsedOrBadInput(config);
  const [fileName, extra] = parsed.positionals;
  if (fileName === undefined) throw new BadInput('name the part file');
  if (extra !== undefined) throw new BadInput(`one part file at a time, not also ${extra}`);
  const stock = parsed.values['stock'] ?? 'production';
  if (stock !== 'trial' && stock !== 'production') throw new BadInput(`--stock is trial or production, not ${stock}`);
  return {
    file: { name: path.basename(fileName, '.json'), document: await readPartDocument(fileName), role: stock },
    options: parsed.values,
  };
}

function parsedOrBadInput(config: ParseArgsConfig): {
  readonly positionals: readonly string[];
  readonly values: Readonly<Record<string, string | undefined>>;
} {
  try {
    const { positionals, values } = parseArgs(config);
    const strings = Object.entries(values).map(
      ([key, value]) => [key, typeof value === 'string' ? value : undefined] as const,
    );
    return { positionals, values: Object.fromEntries(strings) };
  } catch (error) {
    // parseArgs throws for options it does not know; its message names them.
    throw new BadInput(error instanceof Error ? error.message : 'the options can’t be read');
  }
}

async function readPartDocument(fileName: string): Promise<PartDocument> {
  const text = await readFile(fileName).catch(() => {
    throw new BadInput(`${fileName} can’t be read`);
  });
  if (text.byteLength > LARGEST_FILE_BYTES) throw new BadInput(`${fileName} is larger than 8 MB`);
  const parsed = partDocumentSchema.safeParse(parseJson(text.toString('utf8'), fileName));
  if (!parsed.success) {
    const issue = parsed.error.issues[0];
    throw new BadInput(`${fileName} is no part document: /${issue?.path.join('/') ?? ''} ${issue?.message ?? ''}`);
  }
  const problem = checkInvariants(parsed.data)[0];
  if (problem) throw new BadInput(`${fileName}: ${problem.message}`);
  return parsed.data;
}

function parseJson(text: string, fileName: string): unknown {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    // Any syntax error is the same news to the person: the file is not JSON.
    throw new BadInput(`${fileName} is not JSON`);
  }
}

/** The part unfolded, or one line that says why it can't be and what offends. */
export function developOrBadInput(file: PartFile): Development {
  const result = developPart(file.document, file.role);
  if (result.ok) return result.development;
  throw new BadInput(result.problems.map((problem) => `${problem.message} (${problem.ids.join(', ')})`).join('; '));
}
