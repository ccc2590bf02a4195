/**
 * The door for designs: whatever comes from a file, a link or a script passes here, and comes out complete or with every fault named.
 */
import { check, type Fault } from './check.ts';
import { JsonError, parseJson } from './json.ts';
import { designSchema, VERSION, variantSchema } from './schema.ts';
import type { Design, Variant } from './types.ts';

export type { Fault } from './check.ts';

export type ReadResult = { readonly design: Design } | { readonly faults: Fault[] };

const MOST_CHARACTERS = 5_000_000;
const DEEPEST = 40;

/** Reads a design file. Defaults are filled in; faults are complete, up to 200. */
export function readDesign(text: string): ReadResult {
  if (text.length > MOST_CHARACTERS) {
    const size = `${(text.length / 1e6).toFixed(1)} million characters`;
    return whole(undefined, 'at most 5 million characters', `The file is ${size} long; expected at most 5 million`);
  }
  try {
    return checkDesign(parseJson(text.replace(/^\ufeff/, ''), DEEPEST));
  } catch (error) {
    if (!(error instanceof JsonError)) throw error;
    return whole(undefined, 'JSON', error.message);
  }
}

/** Checks a value that should be a design: the same faults as `readDesign`, from a parsed file or a script. */
export function checkDesign(value: unknown): ReadResult {
  const version = typeof value === 'object' && value !== null && 'fettle' in value ? value.fettle : undefined;
  if (typeof version === 'number' && Number.isInteger(version) && version > VERSION) {
    const sentence = `This file is a fettle ${version} design; this Fettle reads version ${VERSION}. A newer Fettle will open it.`;
    return whole(version, `version ${VERSION}`, sentence, 'fettle');
  }
  const { value: design, faults } = check(designSchema, value, '');
  return faults.length > 0 ? { faults } : { design: design as Design };
}

/** Checks one variant alone; paths start at the variant: `cell.seriesOhm`. */
export function checkVariant(value: unknown): { readonly variant: Variant } | { readonly faults: Fault[] } {
  const { value: variant, faults } = check(variantSchema, value, '');
  return faults.length > 0 ? { faults } : { variant: variant as Variant };
}

function whole(value: unknown, expected: string, sentence: string, path = ''): { faults: Fault[] } {
  return { faults: [{ path, value, expected, sentence }] };
}
