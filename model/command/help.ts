/** The command's own words about itself. */
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { readText } from './files.ts';
import type { Command, Option } from './line.ts';

const WIDTH = 26;

export const HELP: Option = { name: 'help', about: 'this text, or that of one command' };
export const VERSION: Option = { name: 'version', about: 'the version of Fettle' };

/** All commands in brief. */
export function overallHelp(commands: readonly Command[]): string {
  return `Fettle renders and measures a junction FET at work as a voltage-controlled resistor.

${commands.map((command) => `  ${usageOf(command)}\n      ${command.about}`).join('\n')}

${describeOptions([HELP, VERSION])}

fettle COMMAND --help says what the command's options mean. Options may stand anywhere; -- makes names of files of all that
follows. Values are written as on a schematic (6k8, 100n, -1.2, 1k). Exit code: 0 done, 1 failed, 2 something given cannot be used.
`;
}

/** One command in full. */
export function commandHelp(command: Command): string {
  const options = command.options.length > 0 ? `\n${describeOptions(command.options)}\n` : '';
  return `${usageOf(command)}\n\n${command.about}\n${options}\n${command.notes}\n`;
}

function usageOf({ name, files, options }: Command): string {
  return ['fettle', name, ...files, ...options.map((option) => `[${written(option)}]${option.repeats ? '…' : ''}`)].join(' ');
}

function describeOptions(options: readonly Option[]): string {
  return options.map((option) => `  ${written(option).padEnd(WIDTH)}${option.about}`).join('\n');
}

function written({ name, value }: Option): string {
  return value === undefined ? `--${name}` : `--${name} ${value}`;
}

/** As package.json has it. */
export function version(): string {
  const manifest = join(dirname(fileURLToPath(import.meta.url)), '..', '..', 'package.json');
  return (JSON.parse(readText(manifest)) as { version: string }).version;
}
