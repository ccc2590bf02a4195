/**
 * From element values to the few numbers that advance a cell by one sample.
 *
 * Law      the resistive network with every state capacitor as a voltage source and every inductor as a current source gives the capacitor
 *          currents and inductor voltages f and the FET's port voltages p as linear sums of the states x, the sources u, the constants and the
 *          port currents j;  M·dx/dt + Mu·du/dt = f(x, u, j), M from the capacitances and inductances
 * Scheme   M·(x₁ − x₀)/h + Mu·(u₁ − u₀)/h = Θ·f₁ + (1 − Θ)·f₀, row by row: Θ = ½ (trapezoidal) for coupling capacitors, 1 (backward Euler)
 *          for parasitic ones. The state is voltage only, so values may move between samples
 * Error    global O(h²) from coupling capacitors, O(h) from parasitic ones, times their time constant
 * Source   nodal method reduced to state space: Yeh, Abel & Smith, IEEE TASLP 18 (2010) 728; Holters & Zölzer, DAFx 2011 (from memory)
 *
 * `reduce` writes in place and allocates nothing, so that values can be moved on the audio thread.
 */
import { factor, solve } from './linear.ts';
import { CONSTANT, DRIVES, GATE_SOURCE, type Plan } from './plan.ts';

/** Working memory and result of a reduction. Row-major; widths in `layout`. */
export interface Reduction {
  readonly plan: Plan;
  readonly values: Float64Array;
  /** Network responses: rows are what drives the states, ports (2), output (1); columns as in the plan. */
  readonly response: Float64Array;
  /** Discrete map: rows port voltages (2), new states; columns in `stepColumns`. */
  readonly step: Float64Array;
  readonly work: {
    readonly matrix: Float64Array;
    readonly pivots: Int32Array;
    readonly columns: Float64Array;
    readonly left: Float64Array;
    readonly right: Float64Array;
    readonly statePivots: Int32Array;
  };
}

/** Columns of `step`: old states, new u, old u, old j, new j, the constants, then one for each noise current. */
export function stepColumns(stateCount: number, noiseCount: number) {
  const n = stateCount;
  return { newU: n, oldU: n + 2, oldJ: n + 4, newJ: n + 6, constant: n + 8, noise: n + 9, width: n + 9 + noiseCount };
}

export function createReduction(plan: Plan): Reduction {
  const n = plan.states.length;
  const { width } = stepColumns(n, plan.noisy.length);
  return {
    plan,
    values: Float64Array.from(plan.values),
    response: new Float64Array((n + 3) * plan.width),
    step: new Float64Array((n + 2) * width),
    work: {
      matrix: new Float64Array(plan.size * plan.size),
      pivots: new Int32Array(plan.size),
      columns: new Float64Array(plan.size * plan.width),
      left: new Float64Array(n * n),
      right: new Float64Array(n * width),
      statePivots: new Int32Array(n),
    },
  };
}

/** Computes `response` from `values`. False when the network is singular (a node without a path). */
export function respond(reduction: Reduction): boolean {
  const { plan, values, response, work } = reduction;
  const { size, width } = plan;
  const n = plan.states.length;
  work.matrix.fill(0);
  for (let i = 0; i < plan.matrix.target.length; i++) {
    const element = plan.matrix.element[i];
    work.matrix[plan.matrix.target[i]] += plan.matrix.sign[i] * (element < 0 ? 1 : values[element]);
  }
  if (!factor(work.matrix, work.pivots, size)) return false;
  work.columns.set(plan.columns);
  for (let i = 0; i < plan.constants.target.length; i++) {
    work.columns[plan.constants.target[i] * width + n + CONSTANT] += plan.constants.sign[i] * values[plan.constants.element[i]];
  }
  solve(work.matrix, work.pivots, size, work.columns, width);
  for (let state = 0; state < n; state++) {
    copyRow(response, state, work.columns, plan.stateRows[state], width);
    subtractRow(response, state, work.columns, plan.stateRowsLess[state], width);
  }
  copyRow(response, n, work.columns, plan.gate, width);
  subtractRow(response, n, work.columns, plan.source, width);
  copyRow(response, n + 1, work.columns, plan.gate, width);
  subtractRow(response, n + 1, work.columns, plan.drain, width);
  copyRow(response, n + 2, work.columns, plan.output, width);
  return true;
}

function copyRow(to: Float64Array, toRow: number, from: Float64Array, fromRow: number, width: number): void {
  for (let i = 0; i < width; i++) to[toRow * width + i] = fromRow < 0 ? 0 : from[fromRow * width + i];
}

function subtractRow(to: Float64Array, toRow: number, from: Float64Array, fromRow: number, width: number): void {
  for (let i = 0; i < width; i++) to[toRow * width + i] -= fromRow < 0 ? 0 : from[fromRow * width + i];
}

/** Computes `step` from `response` for steps of `stepSec`. False when singular. */
export function discretise(reduction: Reduction, stepSec: number): boolean {
  const { plan, response, step, work } = reduction;
  const n = plan.states.length;
  const noise = plan.noisy.length;
  const columns = stepColumns(n, noise);
  const { width } = columns;
  work.left.fill(0);
  work.right.fill(0);
  addStorage(reduction, stepSec);
  for (let row = 0; row < n; row++) addDrives(reduction, row);
  if (!factor(work.left, work.statePivots, n)) return false;
  solve(work.left, work.statePivots, n, work.right, width);
  for (let i = 0; i < n * width; i++) step[2 * width + i] = work.right[i];
  for (let port = 0; port < 2; port++) {
    const p = (n + port) * plan.width;
    const to = port * width;
    for (let column = 0; column < width; column++) {
      let sum = 0;
      for (let state = 0; state < n; state++) sum += response[p + state] * work.right[state * width + column];
      step[to + column] = sum;
    }
    for (let k = 0; k < 2; k++) {
      step[to + columns.newU + k] += response[p + n + k];
      step[to + columns.newJ + k] += response[p + n + GATE_SOURCE + k];
    }
    step[to + columns.constant] += response[p + n + CONSTANT];
    for (let k = 0; k < noise; k++) step[to + columns.noise + k] += response[p + n + DRIVES + k];
  }
  return true;
}

/** Adds Θ·f₁ to the left and to the new drives, (1 − Θ)·f₀ to the old ones. Constants and noise are steady over a step. */
function addDrives({ plan, response, work }: Reduction, row: number): void {
  const n = plan.states.length;
  const columns = stepColumns(n, plan.noisy.length);
  const { newWeight } = plan.states[row];
  const old = 1 - newWeight;
  const f = row * plan.width;
  const r = row * columns.width;
  for (let state = 0; state < n; state++) {
    work.left[row * n + state] -= newWeight * response[f + state];
    work.right[r + state] += old * response[f + state];
  }
  for (let k = 0; k < 2; k++) {
    work.right[r + columns.newU + k] += newWeight * response[f + n + k];
    work.right[r + columns.oldU + k] += old * response[f + n + k];
    work.right[r + columns.newJ + k] += newWeight * response[f + n + GATE_SOURCE + k];
    work.right[r + columns.oldJ + k] += old * response[f + n + GATE_SOURCE + k];
  }
  work.right[r + columns.constant] += response[f + n + CONSTANT];
  for (let k = 0; k < plan.noisy.length; k++) work.right[r + columns.noise + k] += response[f + n + DRIVES + k];
}

/** Adds M/h to both sides and Mu/h to the sources' columns. */
function addStorage({ plan, values, work }: Reduction, stepSec: number): void {
  const n = plan.states.length;
  const { width, newU, oldU } = stepColumns(n, plan.noisy.length);
  for (let row = 0; row < n; row++) {
    const own = values[plan.states[row].element] / stepSec;
    work.left[row * n + row] += own;
    work.right[row * width + row] += own;
    for (let index = 0; index < plan.links.length; index++) {
      const link = plan.links[index];
      const weight = (link.fromStates[row] * values[link.element]) / stepSec;
      if (weight === 0) continue;
      for (let column = 0; column < n; column++) {
        work.left[row * n + column] += weight * link.fromStates[column];
        work.right[row * width + column] += weight * link.fromStates[column];
      }
      for (let k = 0; k < 2; k++) {
        work.right[row * width + newU + k] -= weight * link.fromSources[k];
        work.right[row * width + oldU + k] += weight * link.fromSources[k];
      }
    }
  }
}
