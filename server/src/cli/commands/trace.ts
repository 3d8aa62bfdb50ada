/** Where a command writes. */
export interface CommandOutput {
  stdout(text: string): void;
  stderr(text: string): void;
}

/** `trace PHOTO ...`: reads one photo and prints the outline as JSON. Resolves to the exit code. */
export async function runTrace(argv: readonly string[], io: CommandOutput): Promise<number> {
  io.stderr(`trace: cannot read ${argv[0] ?? 'nothing'} yet\n`);
  return Promise.resolve(2);
}
