import type { Trace, TraceStage } from '@foldwright/shared/fitting/trace';
import { TRACE_STAGES } from '@foldwright/shared/fitting/trace';
import type {
  PhotoReading,
  ReadingOptions,
  ReadsPhotos,
  TemplateFacts,
} from '@foldwright/server/jobs/photo-reader-port';

/** What a reading of a square of 80 mm with one hole of 8 mm gives. */
export const SQUARE_TRACE: Trace = {
  units: 'mm',
  frame: 'scale-sheet',
  outer: [
    { kind: 'line', from: [60, 60], to: [140, 60] },
    { kind: 'line', from: [140, 60], to: [140, 140] },
    { kind: 'line', from: [140, 140], to: [60, 140] },
    { kind: 'line', from: [60, 140], to: [60, 60] },
  ],
  cutouts: [],
  holes: [{ centre: [100, 100], diameterMm: 8 }],
  slots: [],
  uncertaintyMm: 0.14,
  method: 'markers',
  pixelsPerMm: 9.5,
  markersUsed: 20,
  tiltDeg: 12,
  bands: [],
  mostlyFrom: 'the edge of the template',
  warnings: [],
  timingsMs: { total: 1 },
};

/** The smallest JPEG start and end markers; nobody decodes it. */
const PICTURE = Buffer.from([0xff, 0xd8, 0xff, 0xd9]);

/**
 * A reading whose pace the test sets, for what lies around a reading: stages, stop, faults. Reading itself is tested
 * with photos.
 */
export class ScriptedReader implements ReadsPhotos {
  readonly seen: TemplateFacts[] = [];

  /** @param pace called at the beginning of each stage; throws or waits as the test wants */
  constructor(
    private readonly pace: (stage: TraceStage, signal: AbortSignal) => Promise<void> = async () => undefined,
  ) {}

  async read(_bytes: Buffer, facts: TemplateFacts, { onStage, signal }: ReadingOptions): Promise<PhotoReading> {
    this.seen.push(facts);
    for (const stage of TRACE_STAGES) {
      onStage(stage);
      await this.pace(stage, signal);
      signal.throwIfAborted();
    }
    return { trace: SQUARE_TRACE, rectified: { jpeg: PICTURE, pixelsPerMm: 4, widthMm: 210, heightMm: 297 } };
  }
}
