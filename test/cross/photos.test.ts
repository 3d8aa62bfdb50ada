import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { PhotoReader } from '@foldwright/server/vision/photo-reader';
import type { PhotoReading } from '@foldwright/server/vision/photo-reading';
import { type ScoredOutline, scoreTrace, type TraceScore } from '../support/trace-score';

const FOLDER = join(__dirname, '..', 'fixtures', 'photos');
const NAMES = readdirSync(FOLDER)
  .filter((file) => file.endsWith('.truth.json'))
  .map((file) => file.replace('.truth.json', ''))
  .sort();
const MINUTES = 60_000;

interface Truth extends ScoredOutline {
  readonly thicknessMm: number;
}

function truthOf(name: string): Truth {
  return JSON.parse(readFileSync(join(FOLDER, `${name}.truth.json`), 'utf8')) as Truth;
}

function row(name: string, reading: PhotoReading, score: TraceScore): string {
  const { trace } = reading;
  const cells = [
    score.meanMm.toFixed(3),
    score.p99Mm.toFixed(3),
    score.maxMm.toFixed(3),
    `${trace.holes.length}+${trace.slots.length}+${trace.cutouts.length}`,
    score.worstCentreMm.toFixed(3),
    score.worstDiameterMm.toFixed(3),
    `${(100 * score.insideBand).toFixed(1)} %`,
    score.medianHalfWidthMm.toFixed(3),
    String(trace.timingsMs['total']),
  ];
  return `${name.padEnd(32)}${cells.map((cell) => cell.padStart(10)).join('')}`;
}

describe('photos with known truth', () => {
  const reader = new PhotoReader();
  const table = [
    `${'photo'.padEnd(32)}${['mean', 'p99', 'max', 'h+s+c', 'centre', 'size', 'in band', 'half', 'ms'].map((t) => t.padStart(10)).join('')}`,
  ];

  afterAll(() => {
    reader.close();
    process.stdout.write(`\nAll lengths in mm.\n${table.join('\n')}\n`);
  });

  it('are at least ten', () => {
    expect(NAMES.length).toBeGreaterThanOrEqual(10);
  });

  it.each(NAMES)(
    '%s is traced within the limits',
    async (name) => {
      const truth = truthOf(name);
      const reading = await reader.read(readFileSync(join(FOLDER, `${name}.jpg`)), { thicknessMm: truth.thicknessMm });
      const { trace } = reading;
      const score = scoreTrace(trace, truth);
      table.push(row(name, reading, score));
      expect(trace.holes).toHaveLength(truth.holes.length);
      expect(trace.slots).toHaveLength(truth.slots.length);
      expect(trace.cutouts).toHaveLength(truth.cutouts.length);
      expect(score.meanMm).toBeLessThanOrEqual(0.15);
      expect(score.p99Mm).toBeLessThanOrEqual(0.5);
      expect(score.worstCentreMm).toBeLessThanOrEqual(0.15);
      expect(score.worstDiameterMm).toBeLessThanOrEqual(0.2);
      expect(score.insideBand).toBeGreaterThanOrEqual(0.95);
      expect(score.medianHalfWidthMm).toBeLessThanOrEqual(0.3);
      expect(score.worstGapMm).toBeLessThanOrEqual(0.01);
    },
    3 * MINUTES,
  );
});
