import type { Design } from './types.ts';

/** A design as the text of a file, the variant at index `first` before the others: whoever opens it gets that one. */
export function designText(design: Design, first = 0): string {
  const variants = [design.variants[first], ...design.variants.filter((_, index) => index !== first)];
  return `${JSON.stringify({ ...design, variants }, null, 2)}\n`;
}
