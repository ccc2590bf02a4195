/**
 * The scheme's equations for one step, written from the network's 32 digits.
 *
 * Scheme   in the row of state k, Σ M·(difference of state c)/h + Σ Mu·(u₁ − u₀)/h = ½·(f₁ + f₀) where k is trapezoidal, f₁ where it is stiff. The difference is
 *          47/24·x₁ − 7/2·x₀ + 9/4·x₋₁ − 5/6·x₋₂ + 1/8·x₋₃ where both k and c are stiff, x₁ − x₀ otherwise (model/cell/reduce.ts)
 */
import { AUDIO, CONSTANT, GATE_SOURCE, type Network } from './network.ts';
import { addNumber, addProduct, solveTwofold } from './twofold.ts';

const NEWEST = 47 / 24;

/** What a step knows: states before it and the past of the stiff ones as their difference weighs it, sources and port currents before and after, and 1. */
export function knownPlaces(n: number) {
  return { past: n, newU: 2 * n, oldU: 2 * n + 2, newJ: 2 * n + 4, oldJ: 2 * n + 6, one: 2 * n + 8, width: 2 * n + 9 };
}

export interface Step {
  /** For each state: its new value's weights in all rows (n × n), less what is known (n × width), pairs. A row adds up to 0 A (V for an inductor). */
  readonly left: Float64Array;
  readonly right: Float64Array;
  /** The port voltages after the step, as sums of what is known (2 × width). */
  readonly ports: Float64Array;
  /** |left|·|left⁻¹| (n × n, plain): what a rounding in one row, carried through the inverse, leaves in another. */
  readonly spread: Float64Array;
  /** |ports of states|·|left⁻¹| (2 × n, plain): what it leaves at the ports, V for 1 A. */
  readonly portSpread: Float64Array;
}

export function stepOf(network: Network, trapezoidal: number, stepSec: number): Step {
  const { states: n, rows, width } = network;
  const at = knownPlaces(n);
  const left = new Float64Array(2 * n * n);
  const right = new Float64Array(2 * n * at.width);
  const factor = new Float64Array(2);
  const add = (to: Float64Array, i: number, by: number, row: number, column: number) => {
    factor[0] = by;
    addProduct(to, i, 1, factor, 0, rows, row * width + column);
  };
  for (let k = 0; k < n; k++) {
    const theta = k < trapezoidal ? 0.5 : 1;
    const known = (i: number) => k * at.width + i;
    addStorage(network, trapezoidal, stepSec, k, left, right);
    for (let c = 0; c < n; c++) {
      add(left, k * n + c, -theta, k, c);
      add(right, known(c), 1 - theta, k, c);
    }
    for (let c = 0; c < 2; c++) {
      add(right, known(at.newU + c), theta, k, n + AUDIO + c);
      add(right, known(at.oldU + c), 1 - theta, k, n + AUDIO + c);
      add(right, known(at.newJ + c), theta, k, n + GATE_SOURCE + c);
      add(right, known(at.oldJ + c), 1 - theta, k, n + GATE_SOURCE + c);
    }
    add(right, known(at.one), 1, k, n + CONSTANT);
  }
  return { left, right, ports: portsOf(network, left, right), ...spreadsOf(network, left) };
}

/** M/h and Mu/h of row k: its own capacitance or inductance, and those of the links whose loops it is in. */
function addStorage(network: Network, trapezoidal: number, stepSec: number, k: number, left: Float64Array, right: Float64Array): void {
  const { states: n, links, rows, width, stored } = network;
  const at = knownPlaces(n);
  const difference = (c: number, weight: number) => {
    const bothStiff = k >= trapezoidal && c >= trapezoidal;
    addNumber(left, k * n + c, bothStiff ? NEWEST * weight : weight);
    addNumber(right, k * at.width + (bothStiff ? at.past + c : c), weight);
  };
  difference(k, stored[k] / stepSec);
  for (let l = 0; l < links; l++) {
    const inLoop = (column: number) => Math.round(rows[2 * ((n + 3 + l) * width + column)]);
    const weight = (inLoop(k) * stored[n + l]) / stepSec;
    for (let c = 0; c < n; c++) difference(c, weight * inLoop(c));
    for (let c = 0; c < 2; c++) {
      addNumber(right, k * at.width + at.newU + c, -weight * inLoop(n + AUDIO + c));
      addNumber(right, k * at.width + at.oldU + c, weight * inLoop(n + AUDIO + c));
    }
  }
}

function spreadsOf({ states: n, rows, width }: Network, left: Float64Array): Pick<Step, 'spread' | 'portSpread'> {
  const inverse = new Float64Array(2 * n * n);
  for (let k = 0; k < n; k++) inverse[2 * (k * n + k)] = 1;
  solveTwofold(Float64Array.from(left), n, inverse, n);
  const through = (weights: Float64Array, from: number, c: number) => {
    let sum = 0;
    for (let k = 0; k < n; k++) sum += Math.abs(weights[2 * (from + k)] * inverse[2 * (k * n + c)]);
    return sum;
  };
  return {
    spread: Float64Array.from({ length: n * n }, (_, i) => through(left, Math.floor(i / n) * n, i % n)),
    portSpread: Float64Array.from({ length: 2 * n }, (_, i) => through(rows, (n + Math.floor(i / n)) * width, i % n)),
  };
}

function portsOf({ states: n, rows, width }: Network, left: Float64Array, right: Float64Array): Float64Array {
  const at = knownPlaces(n);
  const solved = Float64Array.from(right);
  if (!solveTwofold(Float64Array.from(left), n, solved, at.width)) throw new Error('the step is singular');
  const ports = new Float64Array(2 * 2 * at.width);
  const one = Float64Array.of(1, 0);
  for (let port = 0; port < 2; port++) {
    const row = (n + port) * width;
    for (let c = 0; c < at.width; c++) {
      for (let k = 0; k < n; k++) addProduct(ports, port * at.width + c, 1, rows, row + k, solved, k * at.width + c);
    }
    for (let c = 0; c < 2; c++) {
      addProduct(ports, port * at.width + at.newU + c, 1, rows, row + n + AUDIO + c, one, 0);
      addProduct(ports, port * at.width + at.newJ + c, 1, rows, row + n + GATE_SOURCE + c, one, 0);
    }
    addProduct(ports, port * at.width + at.one, 1, rows, row + n + CONSTANT, one, 0);
  }
  return ports;
}
