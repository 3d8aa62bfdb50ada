import type { Trace } from '@foldwright/shared/fitting/trace';
import type { DoubtSources } from './doubt';
import type { GroundPlan } from './ground';
import type { PageRaster } from './rectify';
import type { View } from './view';

/** A photo with its scale settled: how it is seen, and the page under it. */
export interface Scene {
  readonly view: View;
  readonly widthMm: number;
  readonly heightMm: number;
  readonly method: Trace['method'];
  readonly markersUsed: number;
  readonly tiltDeg: number;
  readonly blurPx: number;
  readonly warnings: readonly string[];
  readonly doubt: Pick<DoubtSources, 'cameraMm' | 'printShare'>;
  readonly ground: (raster: PageRaster) => GroundPlan;
}
