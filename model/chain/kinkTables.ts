/**
 * What a kink is corrected by: the difference between its sampled shape and the same shape passed through a kernel that keeps the audio band and takes
 * away what folds into it.
 *
 * Law      correction at sample m: ∫h(u)·S(m − d − u)du − S(m − d), m = −1, 0, 1, 2, for a shape S that begins at d after sample 0. Straight lines and
 *          parabolas pass h unchanged: behind the kernel nothing is left to correct
 *          bend  S(τ; u) = τ² at u = 0, 2τ at u = 1, between them 4τ²/(√(1 − u) + √(1 − u + 2uτ))², what the cell makes of its own square law
 *          lag   S(τ; v) = ½τ² at v = 0, τ at v = 1, between them (τ − (1 − e^−aτ)/a)/v with a = v/(1 − v), a corner behind one pole
 * Scheme   made once by Gauss's rule in √τ, which takes a bend's edge off; read by straight lines over shape and d
 * Error    the kernels change the band by −54 dB of the kink's part in it at ×2, −89, −125, −161 dB at ×4, ×8, ×16, and leave −44, −75, −92, −107 dB of
 *          the part that folds, both at 20 kHz of 44.1 kHz
 * Source   residuals of kinks: Esqueda, Bilbao & Välimäki, IEEE TSP 64 (2016) 5255 (from memory); kernels: test/reference/kinks.py
 */
import { exp } from '../device/math.ts';
import { SOFTENING } from './coefficients.ts';

/** Corrected samples, from the one before the last that the kink has not reached. */
export const REACH = 4;
/** Steps of the shape and of the place between two samples. */
export const SHAPES = 32;
export const PLACES = 32;
/** Half width of the kernels. */
const HALF = 2;

/** Gauss's rule with twelve points, the positive half of −1 … 1. */
const NODES = [0.1252334085114689, 0.3678314989981802, 0.5873179542866175, 0.7699026741943047, 0.9041172563704748, 0.9815606342467192];
const WEIGHTS = [
  0.2491470458134027, 0.2334925365383546, 0.20316742672306573, 0.16007832854334622, 0.10693932599531907, 0.04717533638651141,
];

/** Below this aτ the difference of two large terms is its series. */
const SMALL = 1e-3;

const BENDS = tables(bend);
const LAGS = tables(lag);

/** Of the cell's kinks at an oversampling of 2, 4, 8 or 16: over shape, then place, then sample. */
export function bendTable(oversampling: number): Float64Array {
  return tableOf(BENDS, oversampling);
}

/** Of the amplifier's. */
export function lagTable(oversampling: number): Float64Array {
  return tableOf(LAGS, oversampling);
}

function tableOf(all: readonly Float64Array[], oversampling: number): Float64Array {
  return all.find((_, index) => oversampling === 2 << index) ?? new Float64Array(0);
}

function bend(tau: number, u: number): number {
  const sum = Math.sqrt(1 - u) + Math.sqrt(1 - u + 2 * u * tau);
  return (4 * tau * tau) / (sum * sum);
}

function lag(tau: number, v: number): number {
  if (v === 1) return tau;
  const a = v / (1 - v);
  const x = a * tau;
  if (x < SMALL) return ((tau * tau) / (1 - v)) * (0.5 - x / 6 + (x * x) / 24);
  return (tau - (1 - exp(-x)) / a) / v;
}

/** One table for each kernel. */
function tables(shapeAt: (tau: number, shape: number) => number): Float64Array[] {
  const made = SOFTENING.map(() => new Float64Array((SHAPES + 1) * (PLACES + 1) * REACH));
  for (let column = 0; column <= PLACES; column++) {
    for (let m = 0; m < REACH; m++) fill(made, column, m, shapeAt);
  }
  return made;
}

function fill(made: readonly Float64Array[], column: number, m: number, shapeAt: (tau: number, shape: number) => number): void {
  const x = m - 1 - column / PLACES;
  const { taus, widths } = pointsUnder(x);
  const weights = SOFTENING.map((kernel) => taus.map((tau, point) => widths[point] * kernelAt(kernel, x - tau)));
  for (let row = 0; row <= SHAPES; row++) {
    const to = (row * (PLACES + 1) + column) * REACH + m;
    if (x > 0) for (let k = 0; k < made.length; k++) made[k][to] = -shapeAt(x, row / SHAPES);
    for (let point = 0; point < taus.length; point++) {
      const shape = shapeAt(taus[point], row / SHAPES);
      for (let k = 0; k < made.length; k++) made[k][to] += weights[k][point] * shape;
    }
  }
}

/** Points and widths in τ > 0 of an integral over the kernel's reach about x. */
function pointsUnder(x: number): { taus: Float64Array; widths: Float64Array } {
  const from = Math.sqrt(Math.max(0, x - HALF));
  const to = Math.sqrt(Math.max(0, x + HALF));
  const quarter = (to - from) / 4;
  const roots = [from + quarter, to - quarter].flatMap((middle) =>
    NODES.flatMap((node, k) => [-node, node].map((side) => ({ root: middle + quarter * side, width: WEIGHTS[k] * quarter }))),
  );
  return {
    taus: Float64Array.from(roots, ({ root }) => root * root),
    widths: Float64Array.from(roots, ({ root, width }) => 2 * root * width),
  };
}

function kernelAt(coefficients: readonly number[], u: number): number {
  const x = (u * u) / (HALF * HALF);
  let sum = 0;
  for (let k = coefficients.length - 1; k >= 0; k--) sum = sum * x + coefficients[k];
  return (1 - x) * (1 - x) * sum;
}
