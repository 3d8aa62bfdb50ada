// How near traces come to the truth: one line a photo, then a table by kind of material. FOLDWRIGHT_PHOTOS names a folder of
// rendered photos with their truth files beside them; without it the photos of the tests are taken.
import { readFileSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { PhotoReader } from '@foldwright/server/vision/photo-reader';
import { TraceRefusal } from '@foldwright/server/vision/trace-refusal';
import { type ScoredOutline, scoreTrace } from '../support/trace-score';

const FOLDER = process.env['FOLDWRIGHT_PHOTOS'] ?? path.resolve(__dirname, '../fixtures/photos');

interface Truth extends ScoredOutline {
  readonly thicknessMm: number;
  readonly options: { readonly material: string; readonly tilt: number; readonly blur: number; readonly sheet: string };
}

interface Result {
  readonly name: string;
  readonly material: string;
  readonly thicknessMm: number;
  readonly tiltDeg: number;
  readonly refusal: string | null;
  readonly meanMm: number;
  readonly p99Mm: number;
  readonly centreMm: number;
  readonly diameterMm: number;
  readonly insideBand: number;
  readonly halfWidthMm: number;
  /** Primitives of the outline and the cut-outs, holes, slots: traced less true. */
  readonly surplus: readonly [number, number, number, number];
  readonly ms: number;
}

const primitives = (outline: ScoredOutline): number =>
  outline.outer.length + outline.cutouts.reduce((sum, loop) => sum + loop.length, 0);

async function resultOf(reader: PhotoReader, name: string): Promise<Result> {
  const truth = JSON.parse(readFileSync(path.join(FOLDER, `${name}.truth.json`), 'utf8')) as Truth;
  const about = {
    name,
    material: truth.options.material,
    thicknessMm: truth.thicknessMm,
    tiltDeg: truth.options.tilt,
  };
  const began = performance.now();
  try {
    const { trace } = await reader.read(readFileSync(path.join(FOLDER, `${name}.jpg`)), {
      thicknessMm: truth.thicknessMm,
      // The rulers were measured: the renderer prints true to scale.
      printScale: [1, 1],
    });
    const ms = trace.timingsMs['total'] ?? performance.now() - began;
    const score = scoreTrace(trace, truth);
    return {
      ...about,
      refusal: null,
      meanMm: score.meanMm,
      p99Mm: score.p99Mm,
      centreMm: score.worstCentreMm,
      diameterMm: score.worstDiameterMm,
      insideBand: score.insideBand,
      halfWidthMm: score.medianHalfWidthMm,
      surplus: [
        primitives(trace) - primitives(truth),
        trace.cutouts.length - truth.cutouts.length,
        trace.holes.length - truth.holes.length,
        trace.slots.length - truth.slots.length,
      ],
      ms,
    };
  } catch (error) {
    if (!(error instanceof TraceRefusal)) throw error;
    const [nothing, ms] = [Number.NaN, performance.now() - began];
    return {
      ...about,
      refusal: `${error.code}: ${error.message}`,
      ...{ meanMm: nothing, p99Mm: nothing, centreMm: nothing, diameterMm: nothing, insideBand: nothing },
      ...{ halfWidthMm: nothing, surplus: [0, 0, 0, 0], ms },
    };
  }
}

/** The aims for templates up to 3 mm thick and tilts up to 35 degrees. */
const isRight = ({ refusal, meanMm, p99Mm, centreMm, diameterMm, surplus }: Result): boolean =>
  refusal === null &&
  meanMm <= 0.05 &&
  p99Mm <= 0.2 &&
  centreMm <= 0.08 &&
  diameterMm <= 0.12 &&
  surplus.every((count) => count === 0);

const HEAD = ['mean', 'p99', 'centre', 'size', 'in band', 'half', 'prims', 'c/h/s', 'ms'];

function line(result: Result): string {
  const { name, refusal, meanMm, p99Mm, centreMm, diameterMm, insideBand, halfWidthMm, surplus, ms } = result;
  const about = `${name.padEnd(34)}${String(result.thicknessMm).padStart(4)} ${String(result.tiltDeg).padStart(3)}°`;
  if (refusal !== null) return `${about}  ${refusal}`;
  const cells = [
    ...[meanMm, p99Mm, centreMm, diameterMm].map((mm) => mm.toFixed(3)),
    `${(100 * insideBand).toFixed(1)} %`,
    halfWidthMm.toFixed(3),
    `${surplus[0] > 0 ? '+' : ''}${surplus[0]}`,
    surplus.slice(1).join('/'),
    ms.toFixed(0),
  ];
  return `${about}${cells.map((cell) => cell.padStart(9)).join('')}  ${isRight(result) ? '' : '<'}`;
}

function summary(kind: string, results: readonly Result[]): string {
  const read = results.filter(({ refusal }) => refusal === null);
  const mean = (of: (result: Result) => number): number => read.reduce((sum, one) => sum + of(one), 0) / read.length;
  const worst = (of: (result: Result) => number): number => Math.max(...read.map(of));
  const exact = read.filter(({ surplus }) => surplus.every((count) => count === 0)).length;
  return [
    kind.padEnd(14),
    `${read.length}/${results.length} read`,
    `${results.filter(isRight).length} as aimed`,
    `${exact} exact counts`,
    `mean ${mean((one) => one.meanMm).toFixed(3)}`,
    `worst p99 ${worst((one) => one.p99Mm).toFixed(3)}`,
    `worst centre ${worst((one) => one.centreMm).toFixed(3)}`,
    `size ${worst((one) => one.diameterMm).toFixed(3)}`,
    `in band ${(100 * mean((one) => one.insideBand)).toFixed(1)} %`,
    `half-width ${mean((one) => one.halfWidthMm).toFixed(3)}`,
    `${mean((one) => one.ms).toFixed(0)} ms`,
  ].join('  ');
}

async function main(): Promise<void> {
  const reader = new PhotoReader();
  const results: Result[] = [];
  process.stdout.write(`${'photo'.padEnd(34)}   T tilt${HEAD.map((word) => word.padStart(9)).join('')}\n`);
  for (const file of readdirSync(FOLDER).sort()) {
    if (!file.endsWith('.truth.json')) continue;
    const result = await resultOf(reader, file.slice(0, -'.truth.json'.length));
    results.push(result);
    process.stdout.write(`${line(result)}\n`);
  }
  await reader.close();
  process.stdout.write('\n');
  for (const material of [...new Set(results.map((result) => result.material))].sort()) {
    const own = results.filter((result) => result.material === material);
    process.stdout.write(`${summary(material, own)}\n`);
  }
  process.stdout.write(`${summary('all', results)}\n${JSON.stringify(results)}\n`);
}

void main();
