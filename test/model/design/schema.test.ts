import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { defaultDesign, defaultVariant } from '../../../model/design/defaults.ts';
import { setAt } from '../../../model/design/path.ts';
import { checkDesign } from '../../../model/design/read.ts';
import { jsonSchema } from '../../../model/design/schema.ts';
import type { Control, Design, Feedback, Variant } from '../../../model/design/types.ts';
import { edited } from './edited.ts';

type Schema = { readonly [keyword: string]: unknown };

const schema = jsonSchema() as Schema;
const defs = schema.$defs as Record<string, Schema>;

/** Keywords of JSON Schema draft 2020-12 (from memory), as far as ours uses them: `judge(argument, value, schema around it)`. */
const JUDGES: Record<string, (argument: never, value: never, around: Schema) => boolean> = {
  $ref: (reference: string, value) => accepts(defs[reference.replace('#/$defs/', '')], value),
  type: (types: string | string[], value) => [types].flat().includes(typeOf(value)),
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

/** Every schema that describes one value, with its name. */
function leaves(node: Schema = schema): [string, Schema][] {
  const inner = Object.values(node.$defs ?? {}).flatMap((group) => leaves(group as Schema));
  const own = Object.entries((node.properties ?? {}) as Record<string, Schema>).filter(
    ([, field]) => field.type !== 'array' && (field.type || field.enum),
  );
  return [...own, ...inner];
}

describe('the JSON Schema', () => {
  test('is draft 2020-12 and gives each number a unit, a range, a default and a description', () => {
    expect(schema.$schema).toBe('https://json-schema.org/draft/2020-12/schema');
    expect(leaves().length).toBeGreaterThan(45);
    for (const [name, field] of leaves()) {
      expect(field.description, name).toMatch(/\. .*; default \S/);
      expect(field, name).toHaveProperty('default');
      if ([field.type].flat().includes('number')) {
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
    for (const [name, field] of leaves()) {
      if (!('x-unit' in field)) continue;
      const ending = Object.keys(endings)
        .sort((a, b) => b.length - a.length)
        .find((end) => name.endsWith(end));
      expect(field['x-unit'], name).toBe(ending ? endings[ending] : '1');
    }
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

test('the defaults of each shape have the fields of their type', () => {
  const kinds: Feedback['kind'][] = ['none', 'resistor', 'buffered'];
  const sources: Control['source'][] = ['fixed', 'lfo', 'envelope', 'external'];
  for (const design of shapes()) expect(checkDesign(design)).toEqual({ design });
  expect(shapes()).toHaveLength(kinds.length * sources.length);
});

/** A design for each pair of feedback and control. */
function shapes(): Design[] {
  const variants = ['none', 'resistor', 'buffered'].flatMap((kind) =>
    ['fixed', 'lfo', 'envelope', 'external'].map(
      (source): Variant => setAt(setAt(defaultVariant(), 'cell.feedback.kind', kind), 'control.source', source),
    ),
  );
  return variants.map((variant) => ({ ...defaultDesign(), variants: [{ ...variant, devices: [variant.device, variant.device] }] }));
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
