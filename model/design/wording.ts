/** The words in which faults and schemas speak of values. */
import type { Field, FieldInfo } from './kinds.ts';
import { formatQuantity, shorten, type Unit } from './values.ts';

/** `sine, triangle or square` */
export function either(words: readonly string[]): string {
  return words.length < 2 ? words.join('') : `${words.slice(0, -1).join(', ')} or ${words[words.length - 1]}`;
}

/** A value without zeros at its end and with a plain space: `1 Ω`, `100 MΩ`, `−55 °C`. */
export function plainly(value: number, unit: Unit, digits = 15): string {
  return formatQuantity(value, unit, digits, { trimmed: true }).replace('\u2009', ' ');
}

/** Whether a number field may have this value. */
export function inRange({ min, max, whole }: FieldInfo, value: number): boolean {
  return value >= min && value <= max && (!whole || Number.isInteger(value));
}

/** `1 Ω to 100 MΩ`, `a whole number, 0 to 4294967295` */
export function rangeOf(field: FieldInfo): string {
  if (field.whole) return `a whole number, ${field.min} to ${field.max}`;
  return `${plainly(field.min, field.unit)} to ${plainly(field.max, field.unit)}`;
}

/** What a field may hold: `1 Ω to 100 MΩ`, `sine, triangle or square`, `an object`. */
export function expectedOf(field: Field): string {
  switch (field.kind) {
    case 'number':
      return field.nullable ? `${rangeOf(field)}, or null where there is none` : rangeOf(field);
    case 'choice':
    case 'flag':
      return either((field.choices ?? []).map(String));
    case 'text':
      return `${field.min} to ${field.max} characters in one line`;
    case 'list':
      return `a list of ${field.min === field.max ? field.min : `${field.min} to ${field.max}`} ${field.noun}`;
    case 'group':
      return `an object with ${either(Object.keys(field.fields)).replace(/ or (?=\w+$)/, ' and ')}`;
    case 'union':
      return `an object whose ${field.key} is ${either(Object.keys(field.members))}`;
  }
}

/** A value as it stands in the file, short: `-5`, `"abc"`, `an object`, `a list of 7`. */
export function shown(value: unknown): string {
  if (typeof value === 'string') return JSON.stringify(shorten(value));
  if (Array.isArray(value)) return `a list of ${value.length}`;
  if (typeof value === 'object' && value !== null) return 'an object';
  return shorten(String(value));
}

/** `variants[0]` for a list's item, `cell.seriesOhm` for a field, `cell["a b"]` for a name that is no word. */
export function joinPath(path: string, key: string | number): string {
  if (typeof key === 'number') return `${path}[${key}]`;
  if (!/^[A-Za-z_$][\w$]{0,63}$/.test(key)) return `${path}[${JSON.stringify(shorten(key))}]`;
  return path === '' ? key : `${path}.${key}`;
}

/** The known name that an unknown one was probably meant to be. */
export function nearName(name: string, known: readonly string[]): string | undefined {
  if (name.length > 40) return undefined;
  const near = known
    .map((word) => ({ word, distance: editDistance(name.toLowerCase(), word.toLowerCase()) }))
    .filter(({ word, distance }) => (distance <= 3 && distance * 2 < word.length) || (name.length >= 4 && word.startsWith(name)));
  return near.sort((a, b) => a.distance - b.distance)[0]?.word;
}

/** Insertions, deletions and replacements that lead from one word to the other (Levenshtein 1965). */
function editDistance(from: string, to: string): number {
  let row = Array.from({ length: to.length + 1 }, (_, index) => index);
  for (let i = 1; i <= from.length; i++) {
    const next = [i];
    for (let j = 1; j <= to.length; j++) next[j] = Math.min(row[j] + 1, next[j - 1] + 1, row[j - 1] + (from[i - 1] === to[j - 1] ? 0 : 1));
    row = next;
  }
  return row[to.length];
}
