import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { defaultDesign, defaultVariant } from '../../../model/design/defaults.ts';
import { setAt } from '../../../model/design/path.ts';
import { checkDesign } from '../../../model/design/read.ts';
import type { Field, Group } from '../../../model/design/kinds.ts';
import { designSchema, jsonSchema } from '../../../model/design/schema.ts';
import type { Cell, Control, Design, Noise, Variant } from '../../../model/design/types.ts';
import { edited } from './edited.ts';

type Schema = { readonly [keyword: string]: unknown };

const schema = jsonSchema() as Schema;
const defs = schema.$defs as Record<string, Schema>;

/** Keywords of JSON Schema draft 2020-12 (from memory), as far as ours uses them: `judge(argument, value, schema around it)`. */
const JUDGES: Record<string, (argument: never, value: never, around: Schema) => boolean> = {
  $ref: (reference: string, value) => accepts(defs[reference.replace('#/$defs/', '')], value),
  type: (types: string | string[], value) =>
    [types].flat().some((type) => typeOf(value) === type || (type === 'integer' && Number.isInteger(value))),
  enum: (values: unknown[], value) => values.includes(value),
  const: (constant: unknown, value) => value === constant,
  minimum: (limit: number, value: number) => typeof value !== 'number' || value >= limit,
  maximum: (limit: number, value: number) => typeof value !== 'number' || value <= limit,
  minLength: (length: number, value: string) => typeof value !== 'string' || [...value].length >= length,
  maxLength: (length: number, value: string) => typeof value !== 'string' || [...value].length <= length,
  minItems: (length: number, value: unknown[]) => !Array.isArray(value) || value.length >= length,
  maxItems: (length: number, value: unknown[]) => !Array.isArray(value) || value.length <= length,
  items: (item: Schema, value: unknown[]) => !Array.isArray(value) || value.every((inner) => accepts(item, inner)),
  properties: (fields: Record<string, Schema>, value: object) =>
    typeOf(value) !== 'object' ||
    Object.entries(value).every(([name, inner]) => !Object.hasOwn(fields, name) || accepts(fields[name], inner)),
  required: (names: string[], value: object) => typeOf(value) !== 'object' || names.every((name) => Object.hasOwn(value, name)),
  additionalProperties: (_: false, value: object, { properties }) =>
    typeOf(value) !== 'object' || Object.keys(value).every((name) => Object.hasOwn(properties as object, name)),
  oneOf: (options: Schema[], value) => options.filter((option) => accepts(option, value)).length === 1,
  anyOf: (options: Schema[], value) => options.some((option) => accepts(option, value)),
  allOf: (parts: Schema[], value) => parts.every((part) => accepts(part, value)),
  if: (condition: Schema, value, around) => accepts(around[accepts(condition, value) ? 'then' : 'else'] as Schema, value),
};
const NOTES = ['$schema', '$defs', 'title', 'description', 'default', 'x-unit', 'then', 'else'];

/** An unknown keyword throws, so that none goes unjudged. */
function accepts(node: Schema, value: unknown): boolean {
  return Object.entries(node).every(
    ([keyword, argument]) => NOTES.includes(keyword) || JUDGES[keyword](argument as never, value as never, node),
  );
}

function typeOf(value: unknown): string {
  return Array.isArray(value) ? 'array' : value === null ? 'null' : typeof value;
}

/** Every group of the description, each once. */
function groupsIn(field: Field, found = new Set<Group>()): Set<Group> {
  switch (field.kind) {
    case 'group':
      found.add(field);
      for (const inner of Object.values(field.fields)) groupsIn(inner, found);
      break;
    case 'union':
      for (const member of Object.values(field.members)) groupsIn(member, found);
      break;
    case 'list':
      groupsIn(field.item, found);
  }
  return found;
}

/** Every schema that describes one value, with its name. */
function leaves(node: Schema = schema): [string, Schema][] {
  const inner = Object.values(node.$defs ?? {}).flatMap((group) => leaves(group as Schema));
  const own = Object.entries((node.properties ?? {}) as Record<string, Schema>).filter(
    ([, field]) => field.type !== 'array' && (field.type || field.enum),
  );
  return [...own, ...inner];
}

/** Every other schema of a field: of a group, a union, a list and the word that tells a union's members apart. */
function shells(): [string, Schema][] {
  const objects = [schema, ...Object.values(defs)];
  const fields = objects.flatMap((node) => Object.entries((node.properties ?? {}) as Record<string, Schema>));
  return fields
    .filter(([, field]) => !('type' in field && field.type !== 'array') && !field.enum)
    .map(([name, field]) => [name, 'anyOf' in field ? { ...(field.anyOf as Schema[])[0], default: field.default } : field]);
}

describe('the JSON Schema', () => {
  test('is draft 2020-12 and gives each field a unit, a default and a description, and each number a range', () => {
    expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
    expect(leaves().length).toBeGreaterThan(75);
    for (const [name, field] of [...leaves(), ...shells()]) {
      expect(field['x-unit'], name).toMatch(/./);
      expect(field.description, name).toMatch(/\. .*; default \S/);
      expect(field, name).toHaveProperty('default');
      if ([field.type].flat().some((type) => type === 'number' || type === 'integer')) {
        expect(field, name).toMatchObject({
          minimum: expect.any(Number),
          maximum: expect.any(Number),
          'x-unit': expect.stringMatching(/./),
        });
      }
    }
  });

  test('the unit agrees with the one that ends the name', () => {
    const endings: Record<string, string> = {
      PerV: '1/V',
      VPerV: '1',
      APerV: 'S',
      VPerSec: 'V/s',
      H: 'H',
      Ohm: 'Ω',
      F: 'F',
      Hz: 'Hz',
      Sec: 's',
      Db: 'dB',
      C: '°C',
      S: 'S',
      A: 'A',
      V: 'V',
    };
    const ended = new Set<string>();
    for (const [name, field] of leaves()) {
      if (field['x-unit'] === 'none') continue;
      const ending = Object.keys(endings)
        .sort((a, b) => b.length - a.length)
        .find((end) => name.endsWith(end));
      expect(field['x-unit'], name).toBe(ending ? endings[ending] : '1');
      ended.add(ending ?? name);
    }
    // Every ending is in use, and these alone are plain numbers without one.
    expect([...ended].sort()).toEqual([...Object.keys(endings), 'exponent', 'fraction', 'grading', 'ideality', 'seed'].sort());
  });

  test('every shape of the document has a title of its own', () => {
    const titles = [...groupsIn(designSchema)].map(({ title }) => title).sort();
    expect(Object.keys(defs).sort()).toEqual(titles.filter((title) => title !== designSchema.title));
    expect(titles).toHaveLength(new Set(titles).size);
  });

  test('accepts every default that it documents, each in its place', () => {
    expect(accepts(schema, defaultDesign())).toBe(true);
    for (const [name, field] of leaves()) expect(accepts(field, field.default), name).toBe(true);
  });

  test('agrees with the checker on any design, but for what spans several fields', () => {
    const odd = fc.oneof(fc.jsonValue({ maxDepth: 2 }), fc.double(), fc.constantFrom('sine', 'p', 'resistor', 1e9, -1, 0, 'A', null));
    const paths = fc.constantFrom(...editablePaths());
    const edits = fc.array(fc.tuple(paths, odd), { minLength: 1, maxLength: 3 });
    let refused = 0;
    fc.assert(
      fc.property(fc.constantFrom(...shapes()), edits, (design, changes) => {
        const plain = JSON.parse(JSON.stringify(changes.reduce<unknown>((so, [path, value]) => edited(so, path, value), design)));
        const result = checkDesign(plain);
        const faults = 'faults' in result ? result.faults : [];
        if (
          faults.some((fault) =>
            /no other variant|half a period|since limitV|characters in one line|newer/i.test(fault.expected + fault.sentence),
          )
        )
          return;
        if (faults.length > 0) refused++;
        expect(accepts(schema, plain)).toBe(faults.length === 0);
      }),
      { seed: 10, numRuns: 1500 },
    );
    expect(refused).toBeGreaterThan(300);
  });
});

type KindOf<U> = U extends { readonly kind: infer K } ? K : U extends { readonly source: infer S } ? S : never;
type Unions<T> = { [K in keyof T as KindOf<T[K]> extends never ? never : K]: readonly KindOf<T[K]>[] };

/** What each union of the document can be, its default first. */
const CELL_SHAPES: Unions<Cell> = {
  feed: ['direct', 'pickup', 'stage'],
  pad: ['none', 'divider'],
  buffer: ['none', 'follower'],
  coupling: ['none', 'capacitor'],
  smoothing: ['none', 'rc'],
  feedback: ['none', 'resistor', 'buffered'],
  clamp: ['none', 'diode'],
  reference: ['ground', 'halfSupply'],
  sharedGround: ['none', 'shared'],
};
const SOURCES: readonly Control['source'][] = ['fixed', 'lfo', 'envelope', 'external'];
const NOISES: readonly Noise['kind'][] = ['none', 'thermal'];

test('the default of each union is the part that is absent', () => {
  const design = defaultDesign();
  const { cell, control } = design.variants[0];
  for (const [name, [first]] of Object.entries(CELL_SHAPES)) expect(cell[name as keyof Cell], name).toEqual({ kind: first });
  expect(control.source).toBe(SOURCES[0]);
  expect(design.noise).toEqual({ kind: NOISES[0] });
});

test('the defaults of each shape are a design, and have the fields of their type', () => {
  expect(shapes()).toHaveLength(20 + 4 + 2);
  for (const design of shapes()) {
    expect(checkDesign(design)).toEqual({ design });
    expect(accepts(schema, design)).toBe(true);
  }
});

/** A design for each member of each union, and one with every part there is. */
function shapes(): Design[] {
  const cellPaths = Object.entries(CELL_SHAPES).flatMap(([name, kinds]) =>
    kinds.map((kind): [string, string] => [`cell.${name}.kind`, kind]),
  );
  const sourcePaths = SOURCES.map((source): [string, string] => ['control.source', source]);
  const variants = [...cellPaths, ...sourcePaths].map(([path, key]) => setAt(defaultVariant(), path, key));
  const whole = Object.entries(CELL_SHAPES).reduce<Variant>(
    (variant, [name, kinds]) => setAt(variant, `cell.${name}.kind`, kinds[1]),
    defaultVariant(),
  );
  const designs = [...variants, whole].map((variant) => designWith({ ...variant, devices: [variant.device, variant.device] }));
  return [...designs, setAt(designWith(whole), 'noise.kind', 'thermal')];
}

function designWith(variant: Variant): Design {
  return { ...defaultDesign(), variants: [variant] };
}

/** Paths of everything in those designs, inner and outer, and of some things that are not there. */
function editablePaths(): string[] {
  const found = new Set(['extra', 'variants.0.cell.extra', 'variants.0.control.fraction', 'variants.1']);
  const collect = (value: unknown, path: string) => {
    if (path) found.add(path);
    if (typeof value === 'object' && value !== null)
      for (const [key, inner] of Object.entries(value)) collect(inner, path ? `${path}.${key}` : key);
  };
  for (const design of shapes()) collect(design, '');
  return [...found];
}
