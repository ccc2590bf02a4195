import fc from 'fast-check';
import { expect, test } from 'vitest';
import { JsonError, parseJson } from '../../../model/design/json.ts';

test('reads what the engine writes, indented or not', () => {
  fc.assert(
    fc.property(fc.jsonValue({ maxDepth: 6 }), fc.constantFrom(undefined, 2, '\t'), (value, indent) => {
      const text = JSON.stringify(value, null, indent);
      expect(JSON.stringify(parseJson(text, 20))).toBe(JSON.stringify(JSON.parse(text)));
    }),
    { seed: 6 },
  );
});

test('accepts and refuses the same damaged texts as the engine, but for fields named twice', () => {
  const damaged = fc
    .tuple(
      fc.jsonValue({ maxDepth: 3 }),
      fc.nat(),
      fc.nat(3),
      fc.constantFrom('', ',', '"', '}', '[', '\\', '0', '-', 'e', ' ', '\n', 'null', '\u0000'),
    )
    .map(([value, at, removed, inserted]) => {
      const text = JSON.stringify(value);
      const place = at % (text.length + 1);
      return text.slice(0, place) + inserted + text.slice(place + removed);
    });
  const accepts = (read: () => unknown) => {
    try {
      read();
      return true;
    } catch (error) {
      if (error instanceof JsonError && error.message.includes('a second time')) return 'twice';
      expect(error).toBeInstanceOf(SyntaxError);
      return false;
    }
  };
  fc.assert(
    fc.property(damaged, (text) => {
      const ours = accepts(() => parseJson(text, 40));
      if (ours !== 'twice') expect(ours).toBe(accepts(() => JSON.parse(text)));
    }),
    { seed: 7, numRuns: 3000 },
  );
});

test.each([
  ['', 'Line 1, column 1 is not JSON: the file ends; expected a value'],
  ['{\n  "a": NaN\n}', 'Line 2, column 8 is not JSON: found "NaN"; expected a value'],
  ['[1, 2,]', 'Line 1, column 7 is not JSON: found "]"; expected a value'],
  ["{'a': 1}", 'Line 1, column 2 is not JSON: found "\'"; expected the name of a field in double quotes'],
  ['{"a" 1}', 'Line 1, column 6 is not JSON: found "1"; expected a colon'],
  ['{"a": 1 "b": 2}', 'Line 1, column 9 is not JSON: found "\\""; expected a comma or }'],
  ['{"a": 1}}', 'Line 1, column 9 is not JSON: found "}"; expected nothing more'],
  ['{"a": 1, "a": 2}', 'Line 1, column 10 names "a" a second time; expected each field once'],
  ['[[[[1]]]]', 'Line 1, column 4 is too deep; expected at most 3 levels of lists and objects'],
])('%j is refused with its place', (text, message) => expect(() => parseJson(text, 3)).toThrow(message));

test('a field named __proto__ is a field, and reaches no prototype', () => {
  const read = parseJson('{"__proto__": {"polluted": 1}}', 3) as Record<string, unknown>;
  expect(Object.keys(read)).toEqual(['__proto__']);
  expect(Object.getPrototypeOf(read)).toBeNull();
  expect(({} as Record<string, unknown>).polluted).toBeUndefined();
});
