import { PhotoReader } from '../vision/photo-reader';
import type { ReadsPhotos } from './photo-reader-port';

/** The reader of `vision/`, in a process of its own, as the worker calls it. */
export function visionReader(): ReadsPhotos & { close(): void } {
  const photos = new PhotoReader();
  return {
    read: (bytes, facts, { onStage, signal }) =>
      photos.read(
        bytes,
        { thicknessMm: facts.templateThicknessMm, printScale: [facts.printScaleX, facts.printScaleY] },
        { onStage, signal },
      ),
    close: () => photos.close(),
  };
}
