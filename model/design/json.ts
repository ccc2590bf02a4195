/**
 * JSON (RFC 8259) from a file that anybody may have written. Unlike the engine's parser, its faults name line and column in the same
 * words everywhere, it refuses a field that is named twice, and it stops at a depth, so that no file exhausts the stack.
 */

import { shorten } from './values.ts';

export class JsonError extends SyntaxError {
  /** `problem` goes on from the place: `is not JSON: found "N"; expected a value`. */
  constructor(text: string, at: number, problem: string) {
    const lines = text.slice(0, at).split('\n');
    super(`Line ${lines.length}, column ${lines[lines.length - 1].length + 1} ${problem}`);
    this.name = 'JsonError';
  }
}

const SPACE = /[ \t\n\r]*/y;
const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const WORD = /true|false|null/y;
const WORDS: Readonly<Record<string, unknown>> = { true: true, false: false, null: null };

/**
 * @param deepest levels of lists and objects inside one another that are read
 * @returns objects without a prototype, so that a field named `__proto__` is a field like any other
 * @throws JsonError
 */
export function parseJson(text: string, deepest: number): unknown {
  let at = 0;

  function match(pattern: RegExp): string | undefined {
    pattern.lastIndex = at;
    const found = pattern.exec(text)?.[0];
    if (found !== undefined) at += found.length;
    return found;
  }

  function fail(expected: string, where = at): never {
    const found = /^(\w+|.)/su.exec(text.slice(where, where + 24))?.[0];
    throw new JsonError(text, where, `is not JSON: ${found ? `found ${JSON.stringify(found)}` : 'the file ends'}; expected ${expected}`);
  }

  /** Steps over a character and the space after it, if it is the next one. */
  function take(character: string): boolean {
    if (text[at] !== character) return false;
    at++;
    match(SPACE);
    return true;
  }

  function readString(): string {
    const start = at++;
    while (text[at] !== '"') {
      if (at >= text.length || text[at] < ' ') fail('a double quote, the end of a text in one line');
      at += text[at] === '\\' ? 2 : 1;
    }
    at++;
    try {
      return JSON.parse(text.slice(start, at));
    } catch {
      return fail('only the escapes that JSON has in this text', start);
    }
  }

  function readList(depth: number): unknown[] {
    const list: unknown[] = [];
    if (take(']')) return list;
    do list.push(readValue(depth));
    while (take(','));
    if (!take(']')) fail('a comma or ]');
    return list;
  }

  function readObject(depth: number): object {
    const object = Object.create(null);
    if (take('}')) return object;
    do {
      const start = at;
      if (text[at] !== '"') fail('the name of a field in double quotes');
      const name = readString();
      if (Object.hasOwn(object, name))
        throw new JsonError(text, start, `names ${JSON.stringify(shorten(name))} a second time; expected each field once`);
      match(SPACE);
      if (!take(':')) fail('a colon');
      object[name] = readValue(depth);
    } while (take(','));
    if (!take('}')) fail('a comma or }');
    return object;
  }

  function readValue(depth: number): unknown {
    const start = at;
    if (depth === 0 && (text[at] === '[' || text[at] === '{'))
      throw new JsonError(text, at, `is too deep; expected at most ${deepest} levels of lists and objects`);
    if (take('[')) return readList(depth - 1);
    if (take('{')) return readObject(depth - 1);
    const value = text[at] === '"' ? readString() : readWordOrNumber();
    match(SPACE);
    return value;

    function readWordOrNumber(): unknown {
      const word = match(WORD);
      if (word !== undefined) return WORDS[word];
      const number = match(NUMBER);
      return number === undefined ? fail('a value', start) : Number(number);
    }
  }

  match(SPACE);
  const value = readValue(deepest);
  if (at < text.length) fail('nothing more');
  return value;
}
