/**
 * The kinds of field that a document is described with. A description (`schema.ts`) is plain data; checking (`check.ts`), defaults,
 * paths (`path.ts`) and JSON Schema (`json-schema.ts`) all walk the same one.
 */
import type { Unit } from './values.ts';

export type Choice = string | number | boolean;

/** One value that can be set: what the page needs to edit it and the checker to judge it. */
export interface FieldInfo {
  readonly kind: 'number' | 'choice' | 'flag' | 'text';
  readonly unit: Unit;
  /** Limits: of a number in SI units; of a text in characters; of a choice or flag, its place in `choices`. */
  readonly min: number;
  readonly max: number;
  /** True for a number that has no fraction. */
  readonly whole?: true;
  readonly default: Choice | null;
  readonly choices?: readonly Choice[];
  /** True where null is allowed: the part is absent. */
  readonly nullable: boolean;
  readonly description: string;
}

export type Presence = 'required' | 'optional' | `first of ${string}`;

/** An object with named fields. A field may be left out, and then takes its default, unless `presence` says otherwise. */
export interface Group {
  readonly kind: 'group';
  /** Names the group in JSON Schema's `$defs`. */
  readonly title: string;
  readonly description: string;
  readonly fields: Readonly<Record<string, Field>>;
  /** required: must be there. optional: stays absent when left out or null. first of NAME: the first of that list where it is left out. */
  readonly presence: Readonly<Record<string, Presence>>;
  readonly rules: readonly Rule[];
}

/** An object of one of several shapes; the field named `key` tells which. */
export interface Union {
  readonly kind: 'union';
  readonly title: string;
  readonly description: string;
  readonly key: string;
  readonly members: Readonly<Record<string, Group>>;
  readonly default: string;
}

/** A list of `min` to `max` items of one kind. */
export interface List {
  readonly kind: 'list';
  readonly noun: string;
  readonly description: string;
  readonly item: Group;
  readonly min: number;
  readonly max: number;
}

export type Field = FieldInfo | Group | Union | List;

/** What several fields must satisfy together. */
export interface Rule {
  /** The faulty field, its value and what was expected, or null. Fields that are faulty themselves are absent from `group`. */
  fault(group: Readonly<Record<string, unknown>>): { readonly path: string; readonly value: unknown; readonly expected: string } | null;
  /** The same in JSON Schema, where that can say it. */
  readonly jsonSchema?: object;
}

/** Binds a description to the type that it describes: the same fields, no more and no fewer. */
export type FieldsOf<T> = { readonly [K in keyof T]-?: Field };

export function quantity(unit: Unit, min: number, max: number, usual: number, description: string): FieldInfo {
  return { kind: 'number', unit, min, max, default: usual, nullable: false, description };
}

/** A plain number without a fraction. */
export function count(min: number, max: number, usual: number, description: string): FieldInfo {
  return { ...quantity('', min, max, usual, description), whole: true };
}

/** A quantity of a part that may be absent (null, the default). */
export function absentOr(unit: Unit, min: number, max: number, description: string): FieldInfo {
  return { kind: 'number', unit, min, max, default: null, nullable: true, description };
}

export function choice(choices: readonly Choice[], usual: Choice, description: string): FieldInfo {
  return { kind: 'choice', unit: '', min: 0, max: choices.length - 1, default: usual, choices, nullable: false, description };
}

export function flag(usual: boolean, description: string): FieldInfo {
  return { kind: 'flag', unit: '', min: 0, max: 1, default: usual, choices: [true, false], nullable: false, description };
}

export function text(longest: number, usual: string, description: string): FieldInfo {
  return { kind: 'text', unit: '', min: 1, max: longest, default: usual, nullable: false, description };
}

export function group<T>(
  title: string,
  description: string,
  fields: FieldsOf<T>,
  extras: Partial<Pick<Group, 'presence' | 'rules'>> = {},
): Group {
  return { kind: 'group', title, description, fields, presence: {}, rules: [], ...extras };
}

/** A union whose first member is its default. */
export function union(title: string, description: string, members: Union['members'], key = 'kind'): Union {
  return { kind: 'union', title, description, key, members, default: Object.keys(members)[0] };
}

/** A union's member without the field that tells it apart: the type that its group describes. */
export type Member<U, K extends keyof U, V extends U[K]> = Omit<Extract<U, { [P in K]: V }>, K>;

/** The field that tells a union's members apart, as a choice. */
export function keyField(union: Union): FieldInfo {
  return choice(Object.keys(union.members), union.default, union.description);
}

/** The value that stands where a field is left out. */
export function defaultOf(field: Field): unknown {
  switch (field.kind) {
    case 'group': {
      const present = Object.entries(field.fields).filter(([name]) => field.presence[name] !== 'optional');
      return Object.fromEntries(present.map(([name, inner]) => [name, defaultOf(inner)]));
    }
    case 'union':
      return memberDefaults(field, field.default);
    case 'list':
      return Array.from({ length: field.min }, () => defaultOf(field.item));
    default:
      return field.default;
  }
}

/** A union's member with every field at its default. */
export function memberDefaults(union: Union, key: string): Record<string, unknown> {
  return { [union.key]: key, ...(defaultOf(union.members[key]) as object) };
}

/** The member in force in a union's value, if its key names one. */
export function memberIn(union: Union, value: Readonly<Record<string, unknown>>): Group | undefined {
  const key = value[union.key];
  return typeof key === 'string' && Object.hasOwn(union.members, key) ? union.members[key] : undefined;
}
