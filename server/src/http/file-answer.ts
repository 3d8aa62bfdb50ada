import type { Response } from 'express';

/** Bytes to be answered with a content type of their own. */
export interface FileAnswer {
  readonly bytes: Buffer;
  readonly contentType: string;
  /** Name under which a browser saves it. */
  readonly fileName: string;
  /** Whether a browser shows it or saves it. */
  readonly disposition: 'inline' | 'attachment';
  /** Whether the bytes behind this address never change. */
  readonly isImmutable: boolean;
}

/** Name in both forms of RFC 6266: plain ASCII for old readers, UTF-8 for the rest. */
function dispositionOf({ disposition, fileName }: FileAnswer): string {
  const ascii = fileName.replace(/[^\x20-\x7e]|["\\%]/g, '_');
  return `${disposition}; filename="${ascii}"; filename*=UTF-8''${encodeURIComponent(fileName).replace(/['()*]/g, encodeReserved)}`;
}

const encodeReserved = (character: string): string => `%${character.charCodeAt(0).toString(16).toUpperCase()}`;

/** Write the file; what people made stays with them, so shared caches may not keep it. */
export function writeFileAnswer(response: Response, answer: FileAnswer): void {
  response
    .set({
      'Content-Type': answer.contentType,
      'Content-Length': String(answer.bytes.length),
      'Content-Disposition': dispositionOf(answer),
      'Cache-Control': answer.isImmutable ? 'private, max-age=31536000, immutable' : 'private, no-store',
      // A file is data, never a page of ours, whatever is in it.
      'Content-Security-Policy': "default-src 'none'; sandbox",
    })
    .end(answer.bytes);
}
