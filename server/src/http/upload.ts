import { randomUUID } from 'node:crypto';
import { rm } from 'node:fs/promises';
import type { Request, Response } from 'express';
import multer from 'multer';
import { Problem } from './problem';
import type { UploadedFile } from '../files/uploaded-file';

export const MOST_UPLOAD_BYTES = 25 * 1024 * 1024;

export type ReceiveUpload = (request: Request, response: Response) => Promise<UploadedFile>;

/**
 * Takes one file in the field `file` to a folder on disk, under a random name, with the other fields left in
 * `request.body`. A part that is cut off or too large leaves nothing behind.
 * @param directory folder for files that are not accepted yet
 */
export function receiveUploads(directory: string): ReceiveUpload {
  const single = multer({
    storage: multer.diskStorage({
      destination: directory,
      filename: (_request, _file, done) => done(null, randomUUID()),
    }),
    limits: { fileSize: MOST_UPLOAD_BYTES, files: 1, fields: 20, fieldSize: 4096, parts: 21, headerPairs: 50 },
    defParamCharset: 'utf8',
  }).single('file');

  return async (request, response) => {
    if (!request.is('multipart/form-data')) {
      throw new Problem('invalid-input', {
        detail: 'A file has to come as multipart/form-data.',
        errors: [{ pointer: '/file', detail: 'This is missing.' }],
      });
    }
    await new Promise<void>((resolve, reject) => {
      single(request, response, (error: unknown) => {
        if (error === undefined || error === null) resolve();
        else reject(error instanceof multer.MulterError ? error : cutOff());
      });
    });
    const file = request.file;
    if (file === undefined) {
      throw new Problem('invalid-input', {
        detail: 'There was no file.',
        errors: [{ pointer: '/file', detail: 'This is missing.' }],
      });
    }
    // The text fields arrive in an object without a prototype; the schemas want a plain one.
    request.body = { ...request.body };
    response.once('close', () => void rm(file.path, { force: true }));
    return { path: file.path, originalName: shownName(file.originalname), byteLength: file.size };
  };
}

const cutOff = (): Problem =>
  new Problem('invalid-input', {
    detail: 'The upload ended before it was complete.',
    kept: 'Nothing of it was stored; the part is as it was.',
    next: 'Send the file again.',
    errors: [{ pointer: '/file', detail: 'It was cut off.' }],
  });

/** The sender's file name without folders and control characters, short enough to be shown. */
function shownName(name: string): string {
  const base = name.split(/[\\/]/).at(-1) ?? '';
  const printable = [...base].filter((character) => character >= ' ' && character !== '\x7f').join('');
  return printable.trim().slice(0, 120) || 'photo';
}
