import { isReadRequest, type ReadAnswer } from './photo-messages';
import { readPhoto } from './read-photo';
import { TraceRefusal } from './trace-refusal';

function answer(message: ReadAnswer): void {
  process.send?.(message);
}

async function serve(message: unknown): Promise<void> {
  if (!isReadRequest(message)) {
    answer({ kind: 'failure', message: 'not a request to read a photo' });
    return;
  }
  try {
    const { bytes, options } = message;
    const reading = await readPhoto(Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength), options, (stage) =>
      answer({ kind: 'stage', stage }),
    );
    answer({ kind: 'reading', reading });
  } catch (error) {
    if (error instanceof TraceRefusal) answer({ kind: 'refusal', code: error.code, message: error.message });
    else answer({ kind: 'failure', message: error instanceof Error ? error.message : String(error) });
  }
}

process.on('message', (message) => void serve(message));
// The program that asked has gone: so does this one.
process.on('disconnect', () => process.exit(0));
