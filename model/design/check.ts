/**
 * Checks a value against its description and fills in the defaults. Every fault is reported, each with the path, the value and
 * what was expected; nothing is clamped or dropped.
 */
import { defaultOf, type Field, type FieldInfo, type Group, keyField, type List, memberIn, type Union } from './kinds.ts';
import { either, expectedOf, inRange, joinPath, nearName, shown } from './wording.ts';

export interface Fault {
  /** `variants[0].cell.seriesOhm`; '' is the whole. */
  readonly path: string;
  readonly value: unknown;
  readonly expected: string;
  /** `variants[0].cell.seriesOhm is -5; expected 1 Ω to 100 MΩ` */
  readonly sentence: string;
}

/** A list longer than this helps nobody; the last entry then says that there are more. */
const MOST_FAULTS = 200;

const MORE: Fault = { path: '', value: undefined, expected: 'no faults', sentence: `There are more than ${MOST_FAULTS} faults` };

/** Takes a fault in the making, so that a file with a million faults costs no more than one with two hundred. */
type Report = (make: () => Fault) => void;
type Fields = Record<string, unknown>;

/** The checked value, fresh and complete; only to be used when there are no faults. */
export function check(field: Field, value: unknown, path: string): { value: unknown; faults: Fault[] } {
  const faults: Fault[] = [];
  const report: Report = (make) => {
    if (faults.length < MOST_FAULTS) faults.push(make());
    else if (faults.length === MOST_FAULTS) faults.push(MORE);
  };
  return { value: checkField(field, value, path, report), faults };
}

/** Undefined where the value itself is faulty. */
function checkField(field: Field, value: unknown, path: string, report: Report): unknown {
  switch (field.kind) {
    case 'group':
      return isObject(value) ? checkGroup(field, value, path, report) : unexpected(path, value, expectedOf(field), report);
    case 'union':
      return isObject(value) ? checkUnion(field, value, path, report) : unexpected(path, value, expectedOf(field), report);
    case 'list':
      return checkList(field, value, path, report);
    default:
      return fits(field, value) ? value : unexpected(path, value, expectedOf(field) + asNumber(field, value), report);
  }
}

function asNumber(field: FieldInfo, value: unknown): string {
  return field.kind === 'number' && typeof value === 'string' ? ', as a number without quotes' : '';
}

function fits(field: FieldInfo, value: unknown): boolean {
  if (value === null) return field.nullable;
  switch (field.kind) {
    case 'number':
      return typeof value === 'number' && inRange(field, value);
    case 'text':
      return typeof value === 'string' && value.trim() !== '' && [...value].length <= field.max && !/[\p{Cc}\u2028\u2029]/u.test(value);
    default:
      return (field.choices as readonly unknown[]).includes(value);
  }
}

/** `beside` says of a name that is unknown in the group what else it may be: a union's key and the fields of its other members. */
function checkGroup(
  group: Group,
  value: Fields,
  path: string,
  report: Report,
  beside?: { key: string; elsewhere: (name: string) => string | undefined },
): Fields {
  const names = Object.keys(group.fields);
  const known = beside ? [beside.key, ...names] : names;
  for (const name of Object.keys(value)) {
    if (!known.includes(name))
      unknownField(joinPath(path, name), value[name], () => beside?.elsewhere(name) ?? knownHere(name, known), report);
  }
  const checked: Fields = {};
  for (const name of names) {
    const result = checkPresence(group, name, value, joinPath(path, name), report);
    if (result !== undefined) checked[name] = result;
  }
  for (const rule of group.rules) {
    const broken = rule.fault(checked);
    if (broken) unexpected(path === '' ? broken.path : `${path}.${broken.path}`, broken.value, broken.expected, report);
  }
  return checked;
}

function checkPresence(group: Group, name: string, value: Fields, path: string, report: Report): unknown {
  const field = group.fields[name];
  const given = Object.hasOwn(value, name) ? value[name] : undefined;
  const presence = group.presence[name];
  const list = presence?.startsWith('first of ') ? value[presence.slice('first of '.length)] : undefined;
  // Faults of the list's first item are reported where it stands.
  if (given === undefined && Array.isArray(list)) return checkField(field, list[0], path, () => undefined);
  switch (presence) {
    case 'optional':
      return given === undefined || given === null ? undefined : checkField(field, given, path, report);
    case undefined:
      return given === undefined ? defaultOf(field) : checkField(field, given, path, report);
    default:
      return given === undefined ? missing(path, field, report) : checkField(field, given, path, report);
  }
}

function checkUnion(union: Union, value: Fields, path: string, report: Report): unknown {
  const { key, members } = union;
  const keyPath = joinPath(path, key);
  if (!Object.hasOwn(value, key)) return missing(keyPath, keyField(union), report);
  const member = memberIn(union, value);
  if (!member) return unexpected(keyPath, value[key], expectedOf(keyField(union)), report);
  const elsewhere = (name: string) => {
    const owners = Object.keys(members).filter((owner) => Object.hasOwn(members[owner].fields, name));
    return owners.length > 0 ? `only where ${key} is ${either(owners)}` : undefined;
  };
  return { [key]: value[key], ...checkGroup(member, value, path, report, { key, elsewhere }) };
}

function checkList(list: List, value: unknown, path: string, report: Report): unknown {
  if (!Array.isArray(value)) return unexpected(path, value, expectedOf(list), report);
  if (value.length < list.min || value.length > list.max) unexpected(path, value, expectedOf(list), report);
  return value.map((item, index) => checkField(list.item, item, joinPath(path, index), report));
}

function unexpected(path: string, value: unknown, expected: string, report: Report): undefined {
  report(() => ({ path, value, expected, sentence: `${path === '' ? 'The design' : path} is ${shown(value)}; expected ${expected}` }));
}

function missing(path: string, field: Field, report: Report): undefined {
  const about = field.description[0].toLowerCase() + field.description.slice(1).replace(/\.$/, '');
  const expected = `${expectedOf(field)} (${about})`;
  report(() => ({ path, value: undefined, expected, sentence: `${path} is missing; expected ${expected}` }));
}

function unknownField(path: string, value: unknown, suggest: () => string, report: Report): void {
  report(() => {
    const expected = suggest();
    return { path, value, expected, sentence: `${path} is not a field here; expected ${expected}` };
  });
}

function knownHere(name: string, known: readonly string[]): string {
  const near = nearName(name, known);
  return near ? `${near}, perhaps` : either(known);
}

function isObject(value: unknown): value is Fields {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
