import { readFile } from 'node:fs/promises';
import { parseArgs } from 'node:util';
import type { PixelPoint } from '../../vision/dark-quads';
import type { ReadingOptions, ScaleSource } from '../../vision/reading-options';
import { readPhoto } from '../../vision/read-photo';
import { TraceRefusal } from '../../vision/trace-refusal';

/** Where a command writes. */
export interface CommandOutput {
  stdout(text: string): void;
  stderr(text: string): void;
}

const USAGE =
  'usage: trace PHOTO [--thickness MM] [--print-scale X,Y] [--dpi N | --rectangle WxH@x,y;x,y;x,y;x,y | --two-points x,y;x,y=MM]';
/** Single-wall board, what most mock-ups are cut from. */
const USUAL_THICKNESS_MM = 3;

/** Input that cannot be used, in one line. */
class BadInput extends Error {}

function number(text: string | undefined, name: string, low: number, high: number): number {
  const value = Number(text);
  if (text === undefined || text.trim() === '' || !Number.isFinite(value) || value < low || value > high) {
    throw new BadInput(`${name} must be a number from ${low} to ${high}, not ${text ?? 'nothing'}`);
  }
  return value;
}

function pixels(text: string, name: string, count: number): readonly PixelPoint[] {
  const points = text.split(';').map((pair) => {
    const [x, y, ...more] = pair.split(',');
    if (more.length > 0) throw new BadInput(`${name}: expected x,y but found ${pair}`);
    return { x: number(x, `${name} x`, -1e5, 1e5), y: number(y, `${name} y`, -1e5, 1e5) };
  });
  if (points.length !== count) throw new BadInput(`${name} needs ${count} points, not ${points.length}`);
  return points;
}

function rectangle(text: string): ScaleSource {
  const [size = '', corners = ''] = text.split('@');
  const [width, height] = size.toLowerCase().split('x');
  const [a, b, c, d] = pixels(corners, '--rectangle', 4);
  if (!a || !b || !c || !d) throw new BadInput('--rectangle needs four corners');
  return {
    kind: 'rectangle',
    widthMm: number(width, '--rectangle width', 10, 5000),
    heightMm: number(height, '--rectangle height', 10, 5000),
    corners: [a, b, c, d],
  };
}

function twoPoints(text: string): ScaleSource {
  const [ends = '', distance] = text.split('=');
  const [from, to] = pixels(ends, '--two-points', 2);
  if (!from || !to || (from.x === to.x && from.y === to.y))
    throw new BadInput('--two-points needs two different points');
  return { kind: 'two-points', from, to, distanceMm: number(distance, '--two-points distance', 1, 5000) };
}

function readArguments(argv: readonly string[]) {
  try {
    return parseArgs({
      args: [...argv],
      allowPositionals: true,
      options: {
        thickness: { type: 'string' },
        'print-scale': { type: 'string' },
        dpi: { type: 'string' },
        rectangle: { type: 'string' },
        'two-points': { type: 'string' },
      },
    });
  } catch (error) {
    // Unknown options and missing values: what Node says about them is meant for the person.
    throw new BadInput(error instanceof Error ? error.message : String(error));
  }
}

function parse(argv: readonly string[]): { photo: string; options: ReadingOptions } {
  const { values, positionals } = readArguments(argv);
  const [photo, ...more] = positionals;
  if (photo === undefined || more.length > 0) throw new BadInput(`one photo is needed (${USAGE})`);
  const sources: ScaleSource[] = [];
  if (values.dpi !== undefined) sources.push({ kind: 'scan', dpi: number(values.dpi, '--dpi', 50, 4800) });
  if (values.rectangle !== undefined) sources.push(rectangle(values.rectangle));
  if (values['two-points'] !== undefined) sources.push(twoPoints(values['two-points']));
  if (sources.length > 1) throw new BadInput('only one of --dpi, --rectangle and --two-points can be given');
  const thicknessMm =
    values.thickness === undefined ? USUAL_THICKNESS_MM : number(values.thickness, '--thickness', 0, 30);
  const scale = sources[0];
  const printScale = values['print-scale']?.split(',');
  return {
    photo,
    options: {
      thicknessMm,
      ...(scale ? { scale } : {}),
      ...(printScale
        ? {
            printScale: [
              number(printScale[0], '--print-scale X', 0.8, 1.2),
              number(printScale[1], '--print-scale Y', 0.8, 1.2),
            ],
          }
        : {}),
    },
  };
}

async function load(photo: string): Promise<Buffer> {
  try {
    return await readFile(photo);
  } catch {
    // Missing, a folder, not ours to read: one answer.
    throw new BadInput(`${photo} cannot be read`);
  }
}

/**
 * `trace PHOTO ...`: reads one photo and prints the outline as one JSON object.
 * Resolves to the exit code: 0, or 2 with one line that says why.
 */
export async function runTrace(argv: readonly string[], io: CommandOutput): Promise<number> {
  try {
    const { photo, options } = parse(argv);
    const { trace } = await readPhoto(await load(photo), options);
    io.stdout(`${JSON.stringify(trace)}\n`);
    return 0;
  } catch (error) {
    if (!(error instanceof BadInput) && !(error instanceof TraceRefusal)) throw error;
    const prefix = error instanceof TraceRefusal ? `${error.code}: ` : '';
    io.stderr(`trace: ${prefix}${error.message.split('\n')[0] ?? ''}\n`);
    return 2;
  }
}
