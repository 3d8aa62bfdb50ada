import { randomUUID } from 'node:crypto';
import { copyFile, mkdir, readFile, rename, rm, statfs, writeFile } from 'node:fs/promises';
import path from 'node:path';

/** Files of workshops: photos as they came, pictures made from them, documents of releases. */
export interface FileStore {
  /** Folder for uploads that are not accepted yet. */
  readonly incomingDirectory: string;
  /** Keep bytes under a new random name and answer it. */
  put(workshopId: string, extension: string, bytes: Buffer): Promise<string>;
  /** Keep a copy of an uploaded file under a new random name and answer it. */
  keep(workshopId: string, extension: string, uploadedPath: string): Promise<string>;
  read(storedAs: string): Promise<Buffer>;
  /** Remove a file; one that is gone already is no error. */
  remove(storedAs: string): Promise<void>;
  freeBytes(): Promise<number>;
}

/** Names this store gave out: `<workshop>/<random>.<extension>`. Anything else never reaches the disk. */
const STORED_NAME = /^[0-9a-f-]{36}\/[0-9a-f-]{36}\.[a-z0-9]{1,5}$/;

export async function openFileStore(directory: string): Promise<FileStore> {
  const root = path.resolve(directory);
  const incomingDirectory = path.join(root, 'incoming');
  await mkdir(incomingDirectory, { recursive: true });

  const placeOf = (storedAs: string): string => {
    if (!STORED_NAME.test(storedAs)) throw new RangeError(`“${storedAs}” is no name of a stored file.`);
    return path.join(root, storedAs);
  };
  const newName = async (workshopId: string, extension: string): Promise<string> => {
    const name = `${workshopId}/${randomUUID()}.${extension}`;
    await mkdir(path.dirname(placeOf(name)), { recursive: true });
    return name;
  };

  return {
    incomingDirectory,
    async put(workshopId, extension, bytes) {
      const name = await newName(workshopId, extension);
      const draft = path.join(incomingDirectory, randomUUID());
      // Written aside and moved, so that a name never stands for half a file.
      await writeFile(draft, bytes);
      await rename(draft, placeOf(name));
      return name;
    },
    async keep(workshopId, extension, uploadedPath) {
      const name = await newName(workshopId, extension);
      await copyFile(uploadedPath, placeOf(name));
      return name;
    },
    read: (storedAs) => readFile(placeOf(storedAs)),
    remove: (storedAs) => rm(placeOf(storedAs), { force: true }),
    async freeBytes() {
      const { bavail, bsize } = await statfs(root);
      return bavail * bsize;
    },
  };
}
