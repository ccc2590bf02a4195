/** The command line of Fettle: reads the words, runs a command, and turns whatever happens into sentences and an exit code. */
import { BAD_INPUT, CommandFault, FAILED } from './fault.ts';
import { commandHelp, HELP, overallHelp, VERSION, version } from './help.ts';
import { type Command, commandOf, readLine, requireFits } from './line.ts';
import { measure } from './measure.ts';
import { render } from './render.ts';
import { schema } from './schema.ts';

const COMMANDS: readonly Command[] = [render, measure, schema];
const OPTIONS = [HELP, VERSION, ...COMMANDS.flatMap(({ options }) => options)];

async function run(words: readonly string[]): Promise<number> {
  const line = readLine(words, OPTIONS);
  const named = line.words.length > 0 ? commandOf(line, COMMANDS) : undefined;
  if (line.values.has(HELP.name)) process.stdout.write(named ? commandHelp(named.command) : overallHelp(COMMANDS));
  else if (line.values.has(VERSION.name)) process.stdout.write(`${version()}\n`);
  else if (named) {
    requireFits(named.command, named.rest);
    await named.command.run(named.rest);
  } else {
    process.stderr.write(overallHelp(COMMANDS));
    return BAD_INPUT;
  }
  return 0;
}

function report(error: unknown): number {
  const [sentence, exitCode] =
    error instanceof CommandFault
      ? [error.message, error.exitCode]
      : [`Fettle failed, by a fault of its own: ${(error as Error).stack}`, FAILED];
  process.stderr.write(`${sentence}\n`);
  return exitCode;
}

/** A reader that has seen enough (`fettle schema | head -1`) is no fault; any other trouble with stdout is. */
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0);
  process.exit(report(new CommandFault(`stdout cannot be written: ${error.message}`, FAILED)));
});
/** With stderr gone there is nobody left to tell. */
process.stderr.on('error', () => {});

process.exitCode = await run(process.argv.slice(2)).catch(report);
