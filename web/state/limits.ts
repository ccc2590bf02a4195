/** Limits that the designer sets on the sheet. They belong to it, not to the circuit. */
import { computed, signal } from '@preact/signals';
import { shown } from './keptDocument.ts';
import type { Settings } from './settings.ts';

export interface Limit<Size extends number | null = number> {
  /** Reading it subscribes. */
  readonly value: Size;
  /** Returns the sentence that refuses it, or null. */
  set(size: unknown): string | null;
}

/** Where null stands, the limit asks nothing. */
export interface Limits {
  /** The highest THD over the swing that the designer will take, a fraction. */
  readonly thd: Limit;
  /** The most that the control alone may leave at the drain, V peak. */
  readonly feedthroughV: Limit<number | null>;
  /** What the control's circuit can deliver, either side of 0 V. */
  readonly controlV: Limit<number | null>;
  /** How far past VGS(off) the gate's far end must lie at least, V. */
  readonly pastOffV: Limit<number | null>;
  /** Reverse voltage that the gate stands by its data sheet, V. */
  readonly reverseV: Limit;
}

/** Reverse voltage of the gate that small JFETs stand unless their sheet says otherwise, V (common practice, no source: 25 V to 40 V). */
const FIRST_REVERSE_V = 25;

export function createLimits(): Limits {
  return {
    thd: limit<number>(
      0.03,
      (size) => size > 0 && size <= 1,
      'more than 0 and at most 100 %',
      (size) => `${100 * size} %`,
    ),
    feedthroughV: limit<number | null>(0.006, within(10), '0 to 10 V, or «none»'),
    controlV: limit<number | null>(5, within(1000), '0 to 1000 V, or «none»'),
    pastOffV: limit<number | null>(0.1, within(100), '0 to 100 V, or «none»'),
    reverseV: limit<number>(FIRST_REVERSE_V, (size) => size > 0 && size <= 1000, 'more than 0 and at most 1000 V'),
  };
}

const within = (most: number) => (size: number | null) => size === null || (size >= 0 && size <= most);

const volts = (size: number) => `${size} V`;

function limit<Size extends number | null>(
  first: Size,
  fits: (size: Size) => boolean,
  expected: string,
  print: (size: number) => string = volts,
): Limit<Size> {
  const kept = signal(first);
  const isSize = (size: unknown): size is Size => typeof size === 'number' || size === null;
  return {
    get value() {
      return kept.value;
    },
    set(size) {
      if (!isSize(size) || !fits(size))
        return `The limit is ${typeof size === 'number' ? print(size) : shown(size)}; expected ${expected}.`;
      kept.value = size;
      return null;
    },
  };
}

/** To be kept between visits. */
export function limitSettings(limits: Limits): Settings {
  return Object.fromEntries(
    Object.entries(limits).map(([name, each]: [string, Limit<number | null>]) => [
      `limit ${name}`,
      { value: computed(() => each.value), set: (size: unknown) => each.set(size) },
    ]),
  );
}
