/** A kept document, read with the checks that a file must pass. */
import { checkDesign } from '../../model/design/read.ts';
import type { Design } from '../../model/design/types.ts';
import type { DocumentRecord } from './document.ts';

export type DocumentResult =
  /** `note` says what of its history could not be read. */
  { readonly record: DocumentRecord; readonly note: string | null } | { readonly faults: readonly string[] };

export function readDocument(value: unknown): DocumentResult {
  if (!isFields(value)) return { faults: [`It is ${shown(value)}; expected a design with its history.`] };
  const result = checkDesign(value.design);
  if ('faults' in result) return { faults: result.faults.map(({ sentence }) => sentence) };
  const { design } = result;
  const { heardVariant } = value;
  if (typeof heardVariant !== 'number' || design.variants[heardVariant] === undefined)
    return { faults: [`The heard variant is ${shown(heardVariant)}; expected 0 to ${design.variants.length - 1}.`] };
  const [past, future] = [readHistory(value.past), readHistory(value.future)];
  const whole = past.whole && future.whole;
  return {
    record: { design, heardVariant, past: past.designs, future: future.designs },
    note: whole ? null : 'Part of the history of undo could not be read; the rest is there.',
  };
}

/** From the nearest step back to the first one that is faulty: beyond it undo would lead to something else. */
function readHistory(value: unknown): { designs: Design[]; whole: boolean } {
  if (!Array.isArray(value)) return { designs: [], whole: false };
  const designs: Design[] = [];
  for (const each of value.toReversed()) {
    const result = checkDesign(each);
    if ('faults' in result) return { designs, whole: false };
    designs.unshift(result.design);
  }
  return { designs, whole: true };
}

export function isFields(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

export function shown(value: unknown): string {
  const text = typeof value === 'string' ? `“${value}”` : String(JSON.stringify(value));
  return text.length > 60 ? `${text.slice(0, 60)}…` : text;
}
