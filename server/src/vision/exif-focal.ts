/** Tags of the EXIF 2.3 standard (CIPA DC-008): pointer to the camera's directory, focal length in 35 mm terms. */
const CAMERA_DIRECTORY = 0x8769;
const FOCAL_LENGTH_35MM = 0xa405;
const TIFF_START = 'Exif\0\0'.length;
const PLAUSIBLE_MM: readonly [number, number] = [8, 400];

function findTag(exif: Buffer, directory: number, tag: number, isBigEndian: boolean): number | null {
  const short = (at: number): number => (isBigEndian ? exif.readUInt16BE(at) : exif.readUInt16LE(at));
  const entries = short(directory);
  for (let entry = 0; entry < entries; entry++) {
    const at = directory + 2 + entry * 12;
    if (short(at) === tag) return at + 8;
  }
  return null;
}

/** Focal length in 35 mm terms from a raw EXIF block, mm; `null` when it is missing, implausible or broken. */
export function focalLength35Mm(exif: Buffer): number | null {
  try {
    const order = exif.toString('latin1', TIFF_START, TIFF_START + 2);
    if (order !== 'MM' && order !== 'II') return null;
    const isBigEndian = order === 'MM';
    const long = (at: number): number => (isBigEndian ? exif.readUInt32BE(at) : exif.readUInt32LE(at));
    const pointer = findTag(exif, TIFF_START + long(TIFF_START + 4), CAMERA_DIRECTORY, isBigEndian);
    if (pointer === null) return null;
    const value = findTag(exif, TIFF_START + long(pointer), FOCAL_LENGTH_35MM, isBigEndian);
    if (value === null) return null;
    const focal = isBigEndian ? exif.readUInt16BE(value) : exif.readUInt16LE(value);
    return focal >= PLAUSIBLE_MM[0] && focal <= PLAUSIBLE_MM[1] ? focal : null;
  } catch (error) {
    // Offsets in a broken block point past its end.
    if (error instanceof RangeError) return null;
    throw error;
  }
}
