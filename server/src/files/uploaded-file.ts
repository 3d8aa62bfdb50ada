/** A file that came with a request, already on disk under a name of our own. Removed when the request ends. */
export interface UploadedFile {
  readonly path: string;
  /** The sender's name for it; only ever shown. */
  readonly originalName: string;
  readonly byteLength: number;
}
