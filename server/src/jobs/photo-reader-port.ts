import type { Trace, TraceStage } from '@foldwright/shared/fitting/trace';
import type { TemplateKind } from '@foldwright/shared/part/part-document';

/** What a photo can't tell about the template and the print it lies on. */
export interface TemplateFacts {
  readonly templateKind: TemplateKind;
  readonly templateThicknessMm: number;
  /** Length on the print divided by the length it should have, along both edges of the sheet. */
  readonly printScaleX: number;
  readonly printScaleY: number;
}

export interface PhotoReading {
  readonly trace: Trace;
  /** The photo square to the sheet. */
  readonly rectified: {
    readonly jpeg: Buffer | Uint8Array;
    readonly pixelsPerMm: number;
    readonly widthMm: number;
    readonly heightMm: number;
  };
}

export interface ReadingOptions {
  /** Called when a stage begins. */
  readonly onStage: (stage: TraceStage) => void;
  readonly signal: AbortSignal;
}

/** What the worker needs from `vision/`: a photo in, a trace out. */
export interface ReadsPhotos {
  read(bytes: Buffer, facts: TemplateFacts, options: ReadingOptions): Promise<PhotoReading>;
}
