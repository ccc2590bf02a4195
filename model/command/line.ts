/**
 * The command line, read: names of files and options in any order. Written for Fettle since a value may begin with a minus (`--controlV -1.2`),
 * and since each fault names what was written and what there is.
 */
import { either, nearName, shown } from '../design/wording.ts';
import { CommandFault } from './fault.ts';

export interface Option {
  /** Without its two hyphens. */
  readonly name: string;
  /** What the help calls its value; absent for a switch. */
  readonly value?: string;
  readonly about: string;
  /** May be given more than once. */
  readonly repeats?: true;
}

export interface Command {
  readonly name: string;
  readonly files: readonly string[];
  /** One line. */
  readonly about: string;
  readonly options: readonly Option[];
  /** What the help says below the options. */
  readonly notes: string;
  run(line: Line): void | Promise<void>;
}

/** Words that are no options, and the values of each option given ('' for a switch). */
export interface Line {
  readonly words: readonly string[];
  readonly values: ReadonlyMap<string, readonly string[]>;
}

/** Reads words against all the options that any command has. `--` makes names of files of all that follows. */
export function readLine(given: readonly string[], options: readonly Option[]): Line {
  const words: string[] = [];
  const values = new Map<string, string[]>();
  const waiting = [...given];
  for (let word = waiting.shift(); word !== undefined; word = waiting.shift()) {
    if (word === '--') words.push(...waiting.splice(0));
    else if (!/^-[^\d.]/.test(word)) words.push(word);
    else {
      const [written, attached] = splitAtEquals(word);
      const option = optionNamed(written, options);
      if (values.has(option.name) && !option.repeats) throw new CommandFault(`${written} is given twice; expected once`);
      values.set(option.name, [...(values.get(option.name) ?? []), takeValue(option, attached, waiting)]);
    }
  }
  return { words, values };
}

function splitAtEquals(word: string): [string, string | undefined] {
  const at = word.indexOf('=');
  return at < 0 ? [word, undefined] : [word.slice(0, at), word.slice(at + 1)];
}

function optionNamed(written: string, options: readonly Option[]): Option {
  const option = options.find(({ name }) => written === `--${name}`);
  if (option) return option;
  const near = nearName(
    written.replace(/^-+/, ''),
    options.map(({ name }) => name),
  );
  throw new CommandFault(`${written} is not an option; ${near ? `expected --${near}, perhaps` : 'fettle --help lists them'}`);
}

function takeValue(option: Option, attached: string | undefined, waiting: string[]): string {
  if (option.value === undefined) {
    if (attached !== undefined)
      throw new CommandFault(`--${option.name} is ${shown(attached)}; expected the option alone, without a value`);
    return '';
  }
  if (attached === undefined && (waiting.length === 0 || waiting[0].startsWith('--')))
    throw new CommandFault(`--${option.name} has no value; expected ${option.value} after it`);
  return attached ?? (waiting.shift() as string);
}

/** The command that the first word names, and the line without it. */
export function commandOf(line: Line, commands: readonly Command[]): { command: Command; rest: Line } {
  const [word, ...words] = line.words;
  const names = commands.map(({ name }) => name);
  const command = commands.find(({ name }) => name === word);
  if (!command) {
    const near = nearName(word, names);
    throw new CommandFault(`${shown(word)} is not a command; expected ${either(names)}${near ? ` (${near}, perhaps)` : ''}`);
  }
  return { command, rest: { words, values: line.values } };
}

/** Refuses options that the command does not have and any number of files but its own. */
export function requireFits(command: Command, { words, values }: Line): void {
  const names = command.options.map(({ name }) => name);
  for (const name of values.keys()) {
    const known = names.length > 0 ? `expected ${either(names.map((each) => `--${each}`))}` : 'it has none';
    if (!names.includes(name)) throw new CommandFault(`--${name} is not an option of ${command.name}; ${known}`);
  }
  const { files } = command;
  if (words.length === files.length) return;
  const expected = files.length > 0 ? `${files.length} (${files.join(' ')})` : 'none';
  const found = words.length === 0 ? 'no files' : words.length === 1 ? '1 file' : `${words.length} files`;
  const extra = words.length > files.length ? `: ${shown(words[files.length])} is too many` : '';
  throw new CommandFault(`${command.name} is given ${found}; expected ${expected}${extra}`);
}
