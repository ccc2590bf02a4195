/**
 * Elementary functions from + − × ÷ alone, so that every engine returns the same bits.
 *
 * Law      exp: the nearest 32nd of an octave from a table, and Taylor's series for the rest; log: argument reduction and the minimax polynomial of fdlibm (Sun
 *          Microsystems, freely distributable); sine and cosine of a phase in turns: reduction to an eighth of a turn, fdlibm's kernels
 * Error    at most 1 ulp over the ranges tested (test/model/device/math.test.ts, against 50-digit arithmetic)
 * Source   exp: after Tang, ACM TOMS 15 (1989) 144 (from memory); fdlibm e_log.c, k_sin.c, k_cos.c (coefficients from memory, held by the test)
 */

const LN2_HIGH = 6.9314718036912381649e-1;
const LN2_LOW = 1.90821492927058770002e-10;
const INVERSE_LN2 = 1.442695040888963387;
const LOWEST_EXPONENT = -1074;

/** 2^k for k −1074 … 1023, by exact doubling and halving. */
const POWERS_OF_TWO = powersOfTwo();

function powersOfTwo(): Float64Array {
  const table = new Float64Array(1023 - LOWEST_EXPONENT + 1);
  let up = 1;
  for (let k = 0; k <= 1023; k++, up *= 2) table[k - LOWEST_EXPONENT] = up;
  let down = 0.5;
  for (let k = -1; k >= LOWEST_EXPONENT; k--, down /= 2) table[k - LOWEST_EXPONENT] = down;
  return table;
}

/** 2^(1/32) and what it misses by its rounding, from 60-digit arithmetic. */
const ROOT = 1.0218971486541166;
const ROOT_REST = 5.109225028973444e-17;

/** 2^(j/32), j from 0 up, each followed by what it misses by its rounding: products in twice the digits (Dekker, Numer. Math. 18 (1971) 224, from memory). */
const ROOTS = rootsOfTwo();

function rootsOfTwo(): Float64Array {
  const table = new Float64Array(64);
  const [rootUpper, rootLower] = halves(ROOT);
  table[0] = 1;
  for (let j = 2; j < 64; j += 2) {
    const high = table[j - 2];
    const [upper, lower] = halves(high);
    const product = high * ROOT;
    const rounding = lower * rootLower - (product - upper * rootUpper - lower * rootUpper - upper * rootLower);
    const rest = rounding + (high * ROOT_REST + table[j - 1] * ROOT);
    table[j] = product + rest;
    table[j + 1] = rest - (table[j] - product);
  }
  return table;
}

/** Two numbers of half the digits that add up to this. */
function halves(value: number): [number, number] {
  const scaled = 134217729 * value;
  const upper = scaled - (scaled - value);
  return [upper, value - upper];
}

/** e^x. Overflows to Infinity above 709.78, underflows to 0 below −745.13; NaN in, NaN out. */
export function exp(x: number): number {
  const slot = Float64Array.of(x);
  expAt(slot, 0);
  return slot[0];
}

/** Puts e to the power of `slots[at]` in its place: on the audio thread, where a number as an argument or a result may cost memory. */
export function expAt(slots: Float64Array, at: number): void {
  const x = slots[at];
  if (!(x <= 709.782712893384 && x >= -745.1332191019412)) {
    slots[at] = x > 0 ? Number.POSITIVE_INFINITY : x < 0 ? 0 : Number.NaN;
    return;
  }
  const m = (x * (32 * INVERSE_LN2) + (x < 0 ? -0.5 : 0.5)) | 0;
  const j = 2 * (m & 31);
  const k = m >> 5;
  const r = x - m * (LN2_HIGH / 32) - m * (LN2_LOW / 32);
  const t = r * r;
  const p = r + t * (0.5 + r * (1 / 6) + t * (1 / 24 + r * (1 / 120) + t * (1 / 720)));
  const y = ROOTS[j] + (ROOTS[j + 1] + ROOTS[j] * p);
  if (k > 1022) slots[at] = y * 2 * POWERS_OF_TWO[k - 1 - LOWEST_EXPONENT];
  else if (k > -1021) slots[at] = y * POWERS_OF_TWO[k - LOWEST_EXPONENT];
  else slots[at] = y * POWERS_OF_TWO[k + 100 - LOWEST_EXPONENT] * POWERS_OF_TWO[-100 - LOWEST_EXPONENT];
}

/** Natural logarithm. log(0) is −Infinity, of a negative number NaN. */
export function log(x: number): number {
  const slot = Float64Array.of(x);
  logAt(slot, 0);
  return slot[0];
}

/** Between these the exponent is found in four steps. */
const SMALL = POWERS_OF_TWO[-15 - LOWEST_EXPONENT];
const LARGE = POWERS_OF_TWO[16 - LOWEST_EXPONENT];
/** Below this, POWERS_OF_TWO has no reciprocal. */
const TINY = POWERS_OF_TWO[-1000 - LOWEST_EXPONENT];

/** Puts the natural logarithm of `slots[at]` in its place, as `expAt` does. */
export function logAt(slots: Float64Array, at: number): void {
  const x = slots[at];
  if (!(x > 0 && x < Number.POSITIVE_INFINITY)) {
    slots[at] = x === 0 ? Number.NEGATIVE_INFINITY : x > 0 ? x : Number.NaN;
    return;
  }
  let k = x < TINY ? -100 : 0;
  let m = x < TINY ? x * POWERS_OF_TWO[100 - LOWEST_EXPONENT] : x;
  for (let p = m > SMALL && m < LARGE ? 8 : 512; p >= 1; p >>= 1) {
    if (m >= POWERS_OF_TWO[p - LOWEST_EXPONENT]) {
      m *= POWERS_OF_TWO[-p - LOWEST_EXPONENT];
      k += p;
    } else if (m < POWERS_OF_TWO[1 - p - LOWEST_EXPONENT]) {
      m *= POWERS_OF_TWO[p - LOWEST_EXPONENT];
      k -= p;
    }
  }
  if (m >= 1.4142135623730951) {
    m *= 0.5;
    k += 1;
  } else if (m < 0.7071067811865476) {
    m *= 2;
    k -= 1;
  }
  const f = m - 1;
  const s = f / (2 + f);
  const z = s * s;
  const w = z * z;
  const odd = w * (3.999999999940941908e-1 + w * (2.222219843214978396e-1 + w * 1.531383769920937332e-1));
  const even = z * (6.66666666666673513e-1 + w * (2.857142874366239149e-1 + w * (1.818357216161805012e-1 + w * 1.479819860510658591e-1)));
  const r = odd + even;
  const half = 0.5 * f * f;
  slots[at] = k * LN2_HIGH - (half - (s * (half + r) + k * LN2_LOW) - f);
}

/** Logarithm to base ten, within 2 ulp. */
export function log10(x: number): number {
  return log(x) * 0.4342944819032518;
}

/** x^p for x ≥ 0, as exp(p·log x): the relative error is about |p·log x| ulp. */
export function power(x: number, p: number): number {
  if (x === 0) return p === 0 ? 1 : 0;
  return exp(p * log(x));
}

/** 20·log10(ratio), dB. */
export function dbFromRatio(ratio: number): number {
  return 20 * log10(ratio);
}

/** 10^(db/20). */
export function ratioFromDb(db: number): number {
  return exp(db * 0.11512925464970229);
}

const TURN = 6.283185307179586;
/** 2π − TURN. */
const TURN_LOW = 2.4492935982947064e-16;
const SPLIT = 134217729;

function sineKernel(x: number, low: number): number {
  const z = x * x;
  const v = z * x;
  const r =
    8.33333333332248946124e-3 +
    z * (-1.98412698298579493134e-4 + z * (2.75573137070700676789e-6 + z * (-2.50507602534068634195e-8 + z * 1.58969099521155010221e-10)));
  return x - (z * (0.5 * low - v * r) - low - v * -1.66666666666666324348e-1);
}

function cosineKernel(x: number, low: number): number {
  const z = x * x;
  const r =
    z *
    (4.16666666666666019037e-2 +
      z *
        (-1.38888888888741095749e-3 +
          z *
            (2.48015872894767294178e-5 +
              z * (-2.75573143513906633035e-7 + z * (2.0875723212981748279e-9 + z * -1.13596475577881948265e-11)))));
  const half = 0.5 * z;
  const w = 1 - half;
  return w + (1 - w - half + (z * r - x * low));
}

/** sin(2π·(turns + quarters/4)). The product with 2π is carried to double length (Dekker), so that no bit of the phase is lost. */
function sineOfTurns(turns: number, quarters: number): number {
  const nearest = Math.floor(turns * 4 + 0.5);
  const r = turns - nearest / 4;
  const x = r * TURN;
  const rHigh = r * SPLIT - (r * SPLIT - r);
  const tHigh = TURN * SPLIT - (TURN * SPLIT - TURN);
  const rLow = r - rHigh;
  const tLow = TURN - tHigh;
  const low = rHigh * tHigh - x + rHigh * tLow + rLow * tHigh + rLow * tLow + r * TURN_LOW;
  const quadrant = (((nearest + quarters) % 4) + 4) % 4;
  if (quadrant === 0) return sineKernel(x, low);
  if (quadrant === 1) return cosineKernel(x, low);
  return quadrant === 2 ? -sineKernel(x, low) : -cosineKernel(x, low);
}

/** sin(2π·turns), |turns| up to 2^50. */
export function sinTurns(turns: number): number {
  return sineOfTurns(turns, 0);
}

/** cos(2π·turns), |turns| up to 2^50. */
export function cosTurns(turns: number): number {
  return sineOfTurns(turns, 1);
}

/** Angle of the point (x, y) in turns, −½ … ½, by the arctangent's series after halving the angle three times; within 4 ulp. */
export function turnsOf(y: number, x: number): number {
  if (x === 0 && y === 0) return 0;
  const ax = Math.abs(x);
  const ay = Math.abs(y);
  const swapped = ay > ax;
  let t = swapped ? ax / ay : ay / ax;
  for (let i = 0; i < 3; i++) t = t / (1 + Math.sqrt(1 + t * t));
  const z = t * t;
  let sum = 0;
  for (let n = 21; n >= 1; n -= 2) sum = 1 / n - z * sum;
  let turns = (8 * t * sum) / TURN;
  if (swapped) turns = 0.25 - turns;
  if (x < 0) turns = 0.5 - turns;
  return y < 0 ? -turns : turns;
}
