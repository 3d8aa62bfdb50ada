/** Where a command writes. */
export interface CommandOutput {
  stdout(text: string): void;
  stderr(text: string): void;
}

/** Exit codes of every command: done, or input that can't be used (one line on stderr says why). */
export const EXIT = { done: 0, badInput: 2 } as const;

/** Input that can't be used, with the one line that says why. */
export class BadInput extends Error {
  constructor(message: string) {
    super(message.replace(/\s+/g, ' ').trim());
    this.name = 'BadInput';
  }
}

/** Runs a command's body; what a person got wrong becomes one line and exit code 2, anything else is ours and is thrown. */
export async function runCommand(name: string, io: CommandOutput, body: () => Promise<void>): Promise<number> {
  try {
    await body();
    return EXIT.done;
  } catch (error) {
    if (!(error instanceof BadInput)) throw error;
    io.stderr(`${name}: ${error.message}\n`);
    return EXIT.badInput;
  }
}
