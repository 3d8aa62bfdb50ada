import { EXIT, type CommandOutput } from './command';
import { runCheck } from './commands/check';
import { runExport } from './commands/export';
import { runScaleSheet } from './commands/scale-sheet';
import { runTrace } from './commands/trace';
import { runUnfold } from './commands/unfold';

type Command = (argv: readonly string[], io: CommandOutput) => Promise<number>;

const COMMANDS: Readonly<Record<string, Command>> = {
  'scale-sheet': runScaleSheet,
  trace: runTrace,
  unfold: runUnfold,
  check: runCheck,
  export: runExport,
};

async function main(argv: readonly string[]): Promise<number> {
  const io: CommandOutput = {
    stdout: (text) => process.stdout.write(text),
    stderr: (text) => process.stderr.write(text),
  };
  const [name, ...rest] = argv;
  const command = name === undefined ? undefined : COMMANDS[name];
  if (!command) {
    io.stderr(
      `${name === undefined ? 'say what to do' : `there is no command ${name}`}: ${Object.keys(COMMANDS).join(', ')}\n`,
    );
    return EXIT.badInput;
  }
  return command(rest, io);
}

// A pipe that closes early (`| head`) is no fault of ours.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
});
void main(process.argv.slice(2)).then((code) => {
  process.exitCode = code;
});
