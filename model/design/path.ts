/**
 * Values by their path: `cell.seriesOhm`, `control.rateHz`, `devices[0].idssA` (or `devices.0.idssA`) in a variant;
 * `fullScaleV`, `variants[1].cell.feedback.kind` in a design. Nothing is changed in place.
 */
import { check } from './check.ts';
import { parseJson } from './json.ts';
import { type Field, type FieldInfo, type Group, keyField, memberDefaults, memberIn, type Union } from './kinds.ts';
import { designSchema, variantSchema } from './schema.ts';
import type { Design, Variant } from './types.ts';
import { formatQuantity, parseQuantity, QuantityError } from './values.ts';
import { either, inRange, nearName, rangeOf, shown } from './wording.ts';

export type { FieldInfo } from './kinds.ts';

/**
 * The value at a path.
 *
 * @throws RangeError naming the path and what there is instead
 */
export function getAt(object: Design | Variant, path: string): unknown {
  const steps = walk(schemaOf(object), object, path);
  return steps[steps.length - 1].value;
}

/**
 * The object with the value at the path replaced, unchecked (`checkVariant` and `checkDesign` judge it). Another `kind` or `source` brings
 * the defaults of its shape; undefined takes `devices` away.
 *
 * @throws RangeError naming the path and what there is instead
 */
export function setAt<T extends Design | Variant>(object: T, path: string, value: unknown): T {
  const steps = walk(schemaOf(object), object, path);
  let replaced = value;
  for (let index = steps.length - 1; index > 0; index--) {
    replaced = withEntry(steps[index - 1], steps[index].key, replaced, path);
  }
  return replaced as T;
}

/**
 * Unit, limits, default, choices and description of the field at a path, whichever shape the cell and control have now.
 *
 * @throws RangeError naming the path and what there is instead
 */
export function fieldAt(path: string): FieldInfo {
  const top = Object.hasOwn(designSchema.fields, tokensOf(path)[0]) ? designSchema : variantSchema;
  const steps = walk(top, undefined, path);
  const { field } = steps[steps.length - 1];
  if (field.kind === 'group' || field.kind === 'union' || field.kind === 'list') {
    throw new RangeError(`${path} is not one value; it has ${either(entriesOf(field, undefined))}`);
  }
  return field;
}

/** `R2 is 100 Ω; it can be 1 kΩ to 100 MΩ.` for a number past its limits, else null. */
export function rangeFault(field: FieldInfo, value: number, name = 'This'): string | null {
  if (field.kind !== 'number' || inRange(field, value)) return null;
  if (field.whole) return `${name} is ${value}; it can be ${rangeOf(field)}.`;
  const printed = (number: number) => formatQuantity(number, field.unit, 6, { trimmed: true });
  return `${name} is ${printed(value)}; it can be ${printed(field.min)} to ${printed(field.max)}.`;
}

/**
 * Sets the value at a path from what was typed: a quantity (6k8, -1.2), a choice, true or false, null for an absent part, a text, or JSON for a
 * whole object or list. The result is checked as a whole.
 *
 * @throws RangeError with a sentence
 */
export function setFromText<T extends Design | Variant>(object: T, path: string, text: string): T {
  return setAllFromText(object, [[path, text]]);
}

/**
 * The same for several values, in order, checked after the last: values that agree only with one another can be set together.
 *
 * @throws RangeError with a sentence
 */
export function setAllFromText<T extends Design | Variant>(object: T, settings: readonly (readonly [path: string, text: string])[]): T {
  const top = schemaOf(object);
  let set = object;
  for (const [path, text] of settings) {
    const steps = walk(top, set, path);
    set = setAt(set, path, valueFromText(steps[steps.length - 1].field, path, text.trim()));
  }
  const { value, faults } = check(top, set, '');
  if (faults.length > 0) throw new RangeError(faults.map((fault) => fault.sentence).join('; '));
  return value as T;
}

function valueFromText(field: Field, path: string, text: string): unknown {
  const bare = /^".*"$/.test(text) ? text.slice(1, -1) : text;
  switch (field.kind) {
    case 'number':
      return field.nullable && /^(null|none)$/.test(text) ? null : quantityAt(field, path, text);
    case 'choice':
    case 'flag':
      return field.choices?.find((choice) => String(choice) === bare) ?? bare;
    case 'text':
      return bare;
    default:
      return jsonAt(path, text);
  }
}

function quantityAt(field: FieldInfo, path: string, text: string): number {
  try {
    return parseQuantity(text, field.unit);
  } catch (error) {
    throw error instanceof QuantityError ? new QuantityError(`${path}: ${error.fault}`, error.advice) : error;
  }
}

function jsonAt(path: string, text: string): unknown {
  try {
    return parseJson(text, 10);
  } catch (error) {
    throw error instanceof SyntaxError ? new RangeError(`${path}: ${error.message}`) : error;
  }
}

type Entries = Readonly<Record<string, unknown>>;

/** One stop on the way: the key that led here, what stands here by the schema, and its value in the object walked. */
interface Step {
  readonly key: string;
  readonly field: Field;
  readonly value: unknown;
}

function schemaOf(object: Design | Variant): Group {
  return 'fettle' in object ? designSchema : variantSchema;
}

function tokensOf(path: string): string[] {
  if (!/^[^.[\]]+(\.[^.[\]]+|\[\d+\])*$/.test(path))
    throw new RangeError(`“${path}” is not a path; write one such as cell.seriesOhm or devices[0].idssA`);
  return path.match(/[^.[\]]+/g) as string[];
}

/** With an object, only what that object has exists; without one, all that any object could have. */
function walk(top: Group, object: Design | Variant | undefined, path: string): Step[] {
  const steps: Step[] = [{ key: '', field: top, value: object }];
  for (const key of tokensOf(path)) {
    const { field, value } = steps[steps.length - 1];
    if (object && value === undefined) throw new RangeError(`${path} does not exist: this variant has no ${steps[steps.length - 1].key}`);
    const entries = value as Entries | undefined;
    const inner = innerField(field, entries, key);
    if (!inner) throw new RangeError(`${path} does not exist${whatThereIs(field, entries, steps, key)}`);
    steps.push({ key, field: inner, value: entries?.[key] });
  }
  return steps;
}

function innerField(field: Field, value: Entries | undefined, key: string): Field | undefined {
  switch (field.kind) {
    case 'group':
      return Object.hasOwn(field.fields, key) ? field.fields[key] : undefined;
    case 'union':
      if (key === field.key) return keyField(field);
      return membersOf(field, value).find((member) => Object.hasOwn(member.fields, key))?.fields[key];
    case 'list':
      return entriesOf(field, value).includes(key) ? field.item : undefined;
    default:
      return undefined;
  }
}

function entriesOf(field: Field, value: Entries | undefined): string[] {
  switch (field.kind) {
    case 'group':
      return Object.keys(field.fields);
    case 'union':
      return [field.key, ...membersOf(field, value).flatMap((member) => Object.keys(member.fields))];
    case 'list':
      return Array.from({ length: Array.isArray(value) ? value.length : field.max }, (_, index) => String(index));
    default:
      return [];
  }
}

function membersOf(union: Union, value: Entries | undefined): Group[] {
  const present = value && memberIn(union, value);
  return present ? [present] : Object.values(union.members);
}

/** The second half of the sentence about a path that leads nowhere. */
function whatThereIs(field: Field, value: Entries | undefined, steps: readonly Step[], key: string): string {
  const here = steps
    .slice(1)
    .map((step) => step.key)
    .join('.');
  if (field.kind === 'union' && value && innerField(field, undefined, key)) {
    const owners = Object.keys(field.members).filter((owner) => Object.hasOwn(field.members[owner].fields, key));
    return ` while ${here}.${field.key} is ${shown(value[field.key])}; set that to ${either(owners)} first`;
  }
  const known = entriesOf(field, value);
  if (known.length === 0) return `: ${here} is one value`;
  const near = nearName(key, known);
  return `; ${here || 'the top level'} has ${known.join(', ')}${near ? ` (${near}, perhaps)` : ''}`;
}

function withEntry(parent: Step, key: string, next: unknown, path: string): unknown {
  const { field, value } = parent;
  if (Array.isArray(value)) return value.with(Number(key), next);
  const entries = value as Entries;
  if (field.kind === 'union' && key === field.key) {
    if (next === entries[key]) return value;
    if (memberIn(field, { [key]: next })) return memberDefaults(field, next as string);
    throw new RangeError(`${path} is ${shown(next)}; expected ${either(Object.keys(field.members))}`);
  }
  const { [key]: _, ...others } = entries;
  return next === undefined ? others : { ...entries, [key]: next };
}
