/** What is kept of a take beside its samples, and the name of their file, which alone is enough to find them again. */
import type { Take } from './bench.ts';
import { isFields, shown } from './keptDocument.ts';

export interface TakeRecord extends Omit<Take, 'seconds' | 'deleted'> {
  readonly file: string;
  readonly channelCount: number;
  /** Null while it is under way. */
  readonly frames: number | null;
  /** When it was deleted, ms since 1970; null where it was not. */
  readonly deletedMs: number | null;
}

export interface TakeFormat {
  readonly channelCount: number;
  readonly sampleRateHz: number;
}

export const TAKE_KEY = 'take ';

export function newTakeFile({ channelCount, sampleRateHz }: TakeFormat): string {
  return `take-${crypto.randomUUID()}-${channelCount}x${sampleRateHz}.f32`;
}

export function takeKey(file: string): string {
  return `${TAKE_KEY}${file}`;
}

/** Null for a file that is no take's. */
export function formatOf(file: string): TakeFormat | null {
  const found = /^take-[\w-]+-([12])x([1-9]\d{2,6})\.f32$/.exec(file);
  return found === null ? null : { channelCount: Number(found[1]), sampleRateHz: Number(found[2]) };
}

export function framesIn(bytes: number, { channelCount }: TakeFormat): number {
  return Math.floor(bytes / (4 * channelCount));
}

/** The record, or the sentence of what is wrong with it. */
export function readTakeRecord(value: unknown): TakeRecord | string {
  if (!isFields(value)) return `it is ${shown(value)}; expected fields`;
  const whole = (n: unknown, least: number) => typeof n === 'number' && Number.isSafeInteger(n) && n >= least;
  const text = (each: unknown) => typeof each === 'string' && each !== '' && each.length <= 500;
  const { file, frames, deletedMs, k, design } = value;
  const format = typeof file === 'string' ? formatOf(file) : null;
  const checks: readonly (readonly [name: string, ok: boolean, expected: string])[] = [
    ['file', format !== null, 'the name of a take’s file'],
    ['channelCount', format?.channelCount === value.channelCount, `${format?.channelCount}, as in the file’s name`],
    ['sampleRateHz', format?.sampleRateHz === value.sampleRateHz, `${format?.sampleRateHz}, as in the file’s name`],
    ['id', whole(value.id, 1), 'a whole number from 1'],
    ['name', text(value.name), 'a name'],
    ['variant', text(value.variant), 'a name'],
    ['how', value.how === 'heard' || value.how === 'rendered', '“heard” or “rendered”'],
    ['k', k === null || (typeof k === 'number' && k >= 0 && k <= 1), '0 to 1, or null'],
    ['design', design === null || typeof design === 'string', 'a text, or null'],
    ['frames', frames === null || whole(frames, 0), 'a whole number, or null'],
    ['deletedMs', deletedMs === null || whole(deletedMs, 0), 'a time, or null'],
  ];
  const wrong = checks.find(([, ok]) => !ok);
  return wrong === undefined ? (value as unknown as TakeRecord) : `${wrong[0]} is ${shown(value[wrong[0]])}; expected ${wrong[2]}`;
}
