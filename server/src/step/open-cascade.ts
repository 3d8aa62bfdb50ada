import type { OpenCascadeInstance } from 'replicad-opencascadejs';

export type OpenCascade = OpenCascadeInstance;

const LOAD_LIMIT_MS = 60_000;
let loading: Promise<OpenCascade> | undefined;

/**
 * The solid modeller, loaded once in a process. It is a package of its own under its own licence (LGPL-2.1) and is reached through this
 * file alone, so that another build of it can take its place.
 * @throws Error when it has not started within a minute
 */
export function openCascade(): Promise<OpenCascade> {
  loading ??= load();
  return loading;
}

async function load(): Promise<OpenCascade> {
  const { default: start } = await import('replicad-opencascadejs');
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, refuse) => {
    timer = setTimeout(() => refuse(new Error('The solid modeller did not start in time.')), LOAD_LIMIT_MS);
  });
  try {
    // It prints a banner for every file it writes; standard output belongs to whoever started this process.
    return await Promise.race([start({ print: () => undefined, printErr: () => undefined }), late]);
  } finally {
    clearTimeout(timer);
  }
}
