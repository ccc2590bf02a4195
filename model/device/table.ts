/**
 * The smooth law's shape, [ln(1 + e^z)]^Q, as a table of polynomials, so that it costs no exponential for each sample.
 *
 * Scheme   pieces of 1/8 in z from −40 up, each the polynomial of degree 5 through its Chebyshev points, in powers of the distance from the
 *          piece's middle; the slope is the polynomial's own, so that Newton's method sees one function
 * Error    under 1e-14 of the value at VGS = 0 (test/model/device/table.test.ts)
 */
import { cosTurns, exp, log, power } from './math.ts';

export const LOWEST_Z = -40;
export const PIECES_PER_UNIT = 8;
export const TERMS = 6;

/** Tables take milliseconds to make and are only read: the last few stay, the latest asked for at the end. */
const KEPT = new Map<string, Float64Array>();
const MOST_KEPT = 8;

/** Coefficients, TERMS for each piece, from LOWEST_Z up to at least `highestZ`. To be read only: others may have the same array. */
export function smoothTable(exponent: number, highestZ: number): Float64Array {
  const key = `${exponent} ${highestZ}`;
  const table = KEPT.get(key) ?? makeTable(exponent, highestZ);
  KEPT.delete(key);
  KEPT.set(key, table);
  if (KEPT.size > MOST_KEPT) KEPT.delete(KEPT.keys().next().value ?? key);
  return table;
}

function makeTable(exponent: number, highestZ: number): Float64Array {
  const pieces = Math.ceil((highestZ - LOWEST_Z) * PIECES_PER_UNIT);
  const table = new Float64Array(pieces * TERMS);
  const half = 0.5 / PIECES_PER_UNIT;
  for (let piece = 0; piece < pieces; piece++) {
    const middle = LOWEST_Z + (2 * piece + 1) * half;
    const d = Array.from({ length: TERMS }, (_, i) => half * cosTurns((2 * i + 1) / (4 * TERMS)));
    table.set(
      interpolate(
        d,
        d.map((x) => smoothShape(middle + x, exponent)),
      ),
      piece * TERMS,
    );
  }
  return table;
}

/** [ln(1 + e^z)]^Q. */
export function smoothShape(z: number, exponent: number): number {
  const e = exp(-Math.abs(z));
  const u = 1 + e;
  const logOnePlus = u === 1 ? e : (log(u) * e) / (u - 1);
  return power(Math.max(z, 0) + logOnePlus, exponent);
}

/** d/dz of `smoothShape`. */
export function smoothSlope(z: number, exponent: number): number {
  const e = exp(-Math.abs(z));
  const logistic = z >= 0 ? 1 / (1 + e) : e / (1 + e);
  return exponent * smoothShape(z, exponent - 1) * logistic;
}

/** Coefficients in powers of x of the polynomial through (x, y), by divided differences. */
function interpolate(x: readonly number[], y: readonly number[]): number[] {
  const divided = [...y];
  for (let order = 1; order < x.length; order++) {
    for (let i = x.length - 1; i >= order; i--) divided[i] = (divided[i] - divided[i - 1]) / (x[i] - x[i - order]);
  }
  let result = [divided[x.length - 1]];
  for (let i = x.length - 2; i >= 0; i--) {
    const next = [...result.map((value) => -value * x[i]), 0];
    result.forEach((value, k) => {
      next[k + 1] += value;
    });
    next[0] += divided[i];
    result = next;
  }
  return result;
}
