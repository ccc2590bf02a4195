/**
 * Preferred values of resistors and capacitors.
 *
 * Law      each series divides a decade into 6 … 192 nearly equal ratios
 * Valid    any value above 0; the series repeat in every decade
 * Source   IEC 60063. E24 is not the rounding of 10^(n/24) at 2.7 3.0 3.3 3.6 3.9 4.3 4.7 8.2; E192 is, to three digits, but for 9.20.
 *          From memory; test/model/design/preferred.test.ts checks both statements.
 */

export const SERIES_NAMES = ['E6', 'E12', 'E24', 'E48', 'E96', 'E192'] as const;
export type SeriesName = (typeof SERIES_NAMES)[number];

const E24 = '10 11 12 13 15 16 18 20 22 24 27 30 33 36 39 43 47 51 56 62 68 75 82 91'.split(' ');

const E192 = `
100 101 102 104 105 106 107 109 110 111 113 114 115 117 118 120 121 123 124 126 127 129 130 132
133 135 137 138 140 142 143 145 147 149 150 152 154 156 158 160 162 164 165 167 169 172 174 176
178 180 182 184 187 189 191 193 196 198 200 203 205 208 210 213 215 218 221 223 226 229 232 234
237 240 243 246 249 252 255 258 261 264 267 271 274 277 280 284 287 291 294 298 301 305 309 312
316 320 324 328 332 336 340 344 348 352 357 361 365 370 374 379 383 388 392 397 402 407 412 417
422 427 432 437 442 448 453 459 464 470 475 481 487 493 499 505 511 517 523 530 536 542 549 556
562 569 576 583 590 597 604 612 619 626 634 642 649 657 665 673 681 690 698 706 715 723 732 741
750 759 768 777 787 796 806 816 825 835 845 856 866 876 887 898 909 920 931 942 953 965 976 988`
  .trim()
  .split(/\s+/);

const everyNth = (steps: readonly string[], n: number) => steps.filter((_, index) => index % n === 0);

const SERIES: Readonly<Record<SeriesName, readonly string[]>> = {
  E6: everyNth(E24, 4),
  E12: everyNth(E24, 2),
  E24,
  E48: everyNth(E192, 4),
  E96: everyNth(E192, 2),
  E192,
};

/** Values this close, relative, are the same preferred value: what arithmetic leaves behind is not a step. */
const SAME = 1e-9;

/** The preferred values of one decade, 1 to under 10, ascending. */
export function preferredDecade(series: SeriesName): number[] {
  return SERIES[series].map((step) => stepValue(step, 0));
}

/** The next preferred value above (1) or below (−1) any positive value, on a preferred one or not. */
export function stepPreferred(value: number, series: SeriesName, direction: 1 | -1): number {
  const { below, above } = neighbours(value, series);
  return direction === 1 ? above : below;
}

/** The preferred value nearest by ratio; of two equally near, the upper. */
export function nearestPreferred(value: number, series: SeriesName): number {
  const { below, at, above } = neighbours(value, series);
  return at ?? (value / below < above / value ? below : above);
}

function neighbours(value: number, series: SeriesName): { below: number; at: number | undefined; above: number } {
  if (!(value > 0 && Number.isFinite(value))) throw new RangeError(`value is ${value}; expected more than 0`);
  const decade = Number(value.toExponential().split('e')[1]);
  const steps = [decade - 1, decade, decade + 1].flatMap((exponent) => SERIES[series].map((step) => stepValue(step, exponent)));
  return {
    below: steps.findLast((step) => step < value * (1 - SAME)) as number,
    at: steps.find((step) => Math.abs(step - value) <= value * SAME),
    above: steps.find((step) => step > value * (1 + SAME)) as number,
  };
}

/** `47` or `470` in decade 3 is 4700, the nearest double to that decimal. */
function stepValue(step: string, exponent: number): number {
  return Number(`${step}e${exponent - step.length + 1}`);
}
