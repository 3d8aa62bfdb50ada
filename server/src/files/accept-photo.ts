import { open } from 'node:fs/promises';
import sharp from 'sharp';
import { Problem } from '../http/problem';

/** A photo that was looked into and found to be one. */
export interface AcceptedPhoto {
  readonly mediaType: 'image/jpeg' | 'image/png' | 'image/webp';
  readonly extension: 'jpg' | 'png' | 'webp';
  /** Size of the picture held upright. */
  readonly widthPx: number;
  readonly heightPx: number;
  /** The picture made anew: upright, no larger than a screen needs, without anything else the file carried. */
  readonly displayJpeg: Buffer;
}

export const MOST_PIXELS = 50_000_000;
const DISPLAY_SIDE_PX = 2400;
const DECODE_SECONDS = 20;

type Kind = Pick<AcceptedPhoto, 'mediaType' | 'extension'> & { readonly format: 'jpeg' | 'png' | 'webp' };

/**
 * Kind of a picture by its first bytes, whatever its name says; undefined for everything else.
 * Source: ITU-T T.81 (JPEG: SOI and a marker), ISO/IEC 15948 (PNG signature), RFC 9649 (WebP in RIFF).
 */
export function sniffPicture(head: Buffer): Kind | undefined {
  if (head.subarray(0, 3).equals(Buffer.from([0xff, 0xd8, 0xff]))) {
    return { format: 'jpeg', mediaType: 'image/jpeg', extension: 'jpg' };
  }
  if (head.subarray(0, 8).equals(Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]))) {
    return { format: 'png', mediaType: 'image/png', extension: 'png' };
  }
  if (head.toString('latin1', 0, 4) === 'RIFF' && head.toString('latin1', 8, 12) === 'WEBP') {
    return { format: 'webp', mediaType: 'image/webp', extension: 'webp' };
  }
  return undefined;
}

async function headOf(path: string): Promise<Buffer> {
  const file = await open(path, 'r');
  try {
    const { buffer, bytesRead } = await file.read(Buffer.alloc(16), 0, 16, 0);
    return buffer.subarray(0, bytesRead);
  } finally {
    await file.close();
  }
}

const notTaken = (): Problem =>
  new Problem('file-type-not-taken', {
    detail: 'A photo has to be a JPEG, PNG or WebP picture.',
    kept: 'Nothing was stored.',
    next: 'Export it as JPEG and send that.',
  });

const damaged = (): Problem =>
  new Problem('photo-refused', {
    detail: 'The picture is damaged or was cut off.',
    kept: 'Nothing was stored; the part is as it was.',
    next: 'Copy it from the camera again, or take it again.',
  });

/**
 * Look into an uploaded file: by its bytes a picture, of a bearable size by its header, and readable to its end.
 * @throws Problem `file-type-not-taken`, `file-too-large`, `photo-refused`
 */
export async function acceptPhoto(path: string): Promise<AcceptedPhoto> {
  const kind = sniffPicture(await headOf(path));
  if (kind === undefined) throw notTaken();
  const options = { failOn: 'truncated', limitInputPixels: MOST_PIXELS, sequentialRead: true } as const;
  const metadata = await sharp(path, { ...options, limitInputPixels: false })
    .metadata()
    .catch(() => {
      throw damaged();
    });
  const { width, height, format, orientation = 1 } = metadata;
  if (format !== kind.format) throw notTaken();
  // Decided from the header, before a single pixel is unpacked: a small file can hold a huge picture.
  if (width * height > MOST_PIXELS) {
    throw new Problem('file-too-large', {
      detail: `The picture has ${Math.round((width * height) / 1e6)} megapixels; up to 50 can be read.`,
      kept: 'Nothing was stored.',
      next: 'Set the camera to a smaller size.',
    });
  }
  const displayJpeg = await sharp(path, options)
    .rotate()
    .resize({ width: DISPLAY_SIDE_PX, height: DISPLAY_SIDE_PX, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#ffffff' })
    .jpeg({ quality: 84 })
    .timeout({ seconds: DECODE_SECONDS })
    .toBuffer()
    .catch(() => {
      throw damaged();
    });
  const isTurned = orientation >= 5;
  return {
    mediaType: kind.mediaType,
    extension: kind.extension,
    widthPx: isTurned ? height : width,
    heightPx: isTurned ? width : height,
    displayJpeg,
  };
}
