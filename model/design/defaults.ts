/** Documents to begin with: every value at the default that the schema documents. */
import { defaultOf } from './kinds.ts';
import { designSchema, variantSchema } from './schema.ts';
import type { Design, Variant } from './types.ts';

export function defaultVariant(name = 'A'): Variant {
  return { ...(defaultOf(variantSchema) as Variant), name };
}

/** One variant, named A. */
export function defaultDesign(): Design {
  return defaultOf(designSchema) as Design;
}
