import sharp, { type Metadata } from 'sharp';
import { focalLength35Mm } from './exif-focal';
import type { Picture } from './picture';
import { TraceRefusal } from './trace-refusal';

export const MAX_PHOTO_BYTES = 25 * 1024 * 1024;
export const MAX_PHOTO_PIXELS = 50_000_000;
const FORMATS: ReadonlySet<string> = new Set(['jpeg', 'png', 'webp']);
const SMALLEST_SIDE_PX = 200;

export interface DecodedPhoto {
  readonly picture: Picture;
  /** Focal length in terms of a 36 mm wide sensor, as the camera noted it; `null` when it did not. */
  readonly focal35Mm: number | null;
}

const NOT_A_PICTURE = 'The file is not a JPEG, PNG or WebP picture, or it is damaged.';

async function readMetadata(bytes: Buffer): Promise<Metadata> {
  try {
    return await sharp(bytes, { limitInputPixels: false, failOn: 'error' }).metadata();
  } catch {
    // sharp throws for whatever it does not know: all of it is the same answer to the person.
    throw new TraceRefusal('notAPicture', NOT_A_PICTURE);
  }
}

/**
 * Decodes an uploaded photo, turned upright as its EXIF orientation says; the density it claims is ignored.
 *
 * @throws TraceRefusal notAPicture, tooLarge
 */
export async function decodePhoto(bytes: Buffer): Promise<DecodedPhoto> {
  if (bytes.length > MAX_PHOTO_BYTES) throw new TraceRefusal('tooLarge', 'The photo is larger than 25 MB.');
  const metadata = await readMetadata(bytes);
  if (!FORMATS.has(metadata.format)) throw new TraceRefusal('notAPicture', NOT_A_PICTURE);
  if (metadata.width * metadata.height > MAX_PHOTO_PIXELS) {
    throw new TraceRefusal('tooLarge', 'The photo has more than 50 megapixels.');
  }
  try {
    const { data, info } = await sharp(bytes, { limitInputPixels: MAX_PHOTO_PIXELS, failOn: 'error' })
      .autoOrient()
      .flatten({ background: '#ffffff' })
      .toColourspace('srgb')
      .raw({ depth: 'uchar' })
      .toBuffer({ resolveWithObject: true });
    if (info.channels !== 3 || Math.min(info.width, info.height) < SMALLEST_SIDE_PX) {
      throw new TraceRefusal('notAPicture', 'The picture is too small to be measured.');
    }
    return {
      picture: {
        widthPx: info.width,
        heightPx: info.height,
        rgb: new Uint8Array(data.buffer, data.byteOffset, data.length),
      },
      focal35Mm: metadata.exif ? focalLength35Mm(metadata.exif) : null,
    };
  } catch (error) {
    if (error instanceof TraceRefusal) throw error;
    // A file that starts as a picture and ends as something else.
    throw new TraceRefusal('notAPicture', NOT_A_PICTURE);
  }
}

/** A copy of a picture for the screen: JPEG without any metadata, at most `maxSidePx` long. */
export async function encodeForDisplay(
  picture: Picture,
  maxSidePx: number,
): Promise<{ jpeg: Buffer; widthPx: number; heightPx: number }> {
  const { data, info } = await sharp(picture.rgb, {
    raw: { width: picture.widthPx, height: picture.heightPx, channels: 3 },
  })
    .resize({ width: maxSidePx, height: maxSidePx, fit: 'inside', withoutEnlargement: true, kernel: 'linear' })
    .jpeg({ quality: 82 })
    .toBuffer({ resolveWithObject: true });
  return { jpeg: data, widthPx: info.width, heightPx: info.height };
}
