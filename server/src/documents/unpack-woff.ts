import { inflateSync } from 'node:zlib';

const WOFF_SIGNATURE = 0x774f4646;
const WOFF_HEADER_BYTES = 44;
const WOFF_ENTRY_BYTES = 20;
const SFNT_HEADER_BYTES = 12;
const SFNT_ENTRY_BYTES = 16;

const padded = (length: number): number => Math.ceil(length / 4) * 4;

/**
 * Unpacks a WOFF 1.0 file into the plain font it holds. The PDF library reads WOFF table by table and runs over the end
 * of the glyph table where the last glyph is empty (the space, in IBM Plex Mono); in a plain font the tables follow each
 * other and it reads on.
 * Source: WOFF File Format 1.0, W3C Recommendation 2012, sections 3 to 5.
 * @throws RangeError when the bytes are no WOFF 1.0 file
 */
export function unpackWoff(woff: Buffer): Buffer {
  if (woff.readUInt32BE(0) !== WOFF_SIGNATURE) throw new RangeError('not a WOFF 1.0 file');
  const tableCount = woff.readUInt16BE(12);
  const entries = Array.from({ length: tableCount }, (_, index) => {
    const at = WOFF_HEADER_BYTES + index * WOFF_ENTRY_BYTES;
    const offset = woff.readUInt32BE(at + 4);
    const packedLength = woff.readUInt32BE(at + 8);
    const length = woff.readUInt32BE(at + 12);
    const packed = woff.subarray(offset, offset + packedLength);
    return {
      tag: woff.readUInt32BE(at),
      checksum: woff.readUInt32BE(at + 16),
      // A table that packing would not shorten is stored as it is.
      data: packedLength < length ? inflateSync(packed) : packed,
    };
  });
  const directoryEnd = SFNT_HEADER_BYTES + tableCount * SFNT_ENTRY_BYTES;
  const sfnt = Buffer.alloc(entries.reduce((end, { data }) => end + padded(data.length), directoryEnd));
  const power = Math.floor(Math.log2(tableCount));
  sfnt.writeUInt32BE(woff.readUInt32BE(4), 0);
  sfnt.writeUInt16BE(tableCount, 4);
  sfnt.writeUInt16BE(2 ** power * 16, 6);
  sfnt.writeUInt16BE(power, 8);
  sfnt.writeUInt16BE((tableCount - 2 ** power) * 16, 10);
  let offset = directoryEnd;
  entries.forEach(({ tag, checksum, data }, index) => {
    const at = SFNT_HEADER_BYTES + index * SFNT_ENTRY_BYTES;
    sfnt.writeUInt32BE(tag, at);
    sfnt.writeUInt32BE(checksum, at + 4);
    sfnt.writeUInt32BE(offset, at + 8);
    sfnt.writeUInt32BE(data.length, at + 12);
    data.copy(sfnt, offset);
    offset += padded(data.length);
  });
  return sfnt;
}
