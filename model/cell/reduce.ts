/**
 * From element values to the few numbers that advance a cell by one sample.
 *
 * Law      the resistive network with every state capacitor as a voltage source and every inductor as a current source gives the capacitor
 *          currents and inductor voltages f and the FET's port voltages p as linear sums of the states x, the sources u, the constants and the
 *          port currents j;  M·dx/dt + Mu·du/dt = f(x, u, j), M from the capacitances and inductances
 * Scheme   row by row. Coupling capacitors and inductors by the trapezoidal rule, M·(x₁ − x₀)/h = ½·(f₁ + f₀). Picofarads, which are stiff, by
 *          backward differences, M·(47/24·x₁ − 7/2·x₀ + 9/4·x₋₁ − 5/6·x₋₂ + 1/8·x₋₃)/h = f₁, the mean of the formulas of third and fourth order,
 *          which damp what they cannot follow. The state is voltages and currents of the past only, so values may move between samples
 * Error    global O(h²) from coupling capacitors and inductors, O(h³) from picofarads; O(h) from a picofarad between a source and a node
 * Source   nodal method reduced to state space: Yeh, Abel & Smith, IEEE TASLP 18 (2010) 728; Holters & Zölzer, DAFx 2011 (from memory)
 *
 * `reduce` writes in place and allocates nothing, so that values can be moved on the audio thread.
 */
import { factor, makeGood, refine, solve } from './linear.ts';
import { CHANNEL, CONSTANT, DRIVES, type Plan, type RestPlan } from './plan.ts';

/** Working memory and result of a reduction. Row-major; widths in `layout`. */
export interface Reduction {
  readonly plan: Plan;
  readonly values: Float64Array;
  /** Network responses: rows are what drives the states, ports (2), output (1); columns as in the plan. */
  readonly response: Float64Array;
  /** The same at rest: rows are states, ports (2), output (1); columns are the drives. Filled by `respondAtRest`. */
  readonly rest: Float64Array;
  /** What each row remembers: columns states (those of the past where the row is stiff), old u, old j. */
  readonly memory: Float64Array;
  /** Discrete map: rows port voltages (2), new states; columns in `stepColumns`. */
  readonly step: Float64Array;
  readonly layout: { readonly step: ReturnType<typeof stepColumns>; readonly memory: ReturnType<typeof memoryColumns> };
  readonly work: {
    readonly matrix: Float64Array;
    readonly pivots: Int32Array;
    readonly columns: Float64Array;
    /** What the network's solution misses. */
    readonly missed: Float64Array;
    /** Of the step: both sides of the rows' equations; the left one factored, the solution, and what that misses. */
    readonly left: Float64Array;
    readonly right: Float64Array;
    readonly factored: Float64Array;
    readonly solved: Float64Array;
    readonly miss: Float64Array;
    readonly statePivots: Int32Array;
  };
}

/** Along the channel, gate to drain, gate to source: `CHANNEL` and what follows it in the plan. */
const PORT_CURRENTS = 3;

/** Columns of `step`: the rows' memories, new u, new j, the constants, then one for each noise current. */
export function stepColumns(stateCount: number, noiseCount: number) {
  const n = stateCount;
  return { newU: n, newJ: n + 2, constant: n + 2 + PORT_CURRENTS, noise: n + 3 + PORT_CURRENTS, width: n + 3 + PORT_CURRENTS + noiseCount };
}

/** Columns of `memory`. */
export function memoryColumns(stateCount: number) {
  const constant = stateCount + 2 + PORT_CURRENTS;
  return { oldU: stateCount, oldJ: stateCount + 2, constant, width: constant + 1 };
}

/** Weight of the new state in the backward difference; `kernels/source.ts` has the past ones'. */
const NEWEST = 47 / 24;

export function createReduction(plan: Plan): Reduction {
  const n = plan.states.length;
  const layout = { step: stepColumns(n, plan.noisy.length), memory: memoryColumns(n) };
  const { width } = layout.step;
  const largest = Math.max(plan.size, plan.rest.size);
  return {
    plan,
    values: Float64Array.from(plan.values),
    response: new Float64Array((n + 3) * plan.width),
    rest: new Float64Array((n + 3) * DRIVES),
    memory: new Float64Array(n * layout.memory.width),
    step: new Float64Array((n + 2) * width),
    layout,
    work: {
      matrix: new Float64Array(largest * largest),
      pivots: new Int32Array(largest),
      columns: new Float64Array(largest * plan.width),
      missed: new Float64Array(largest * plan.width),
      left: new Float64Array(n * n),
      right: new Float64Array(n * width),
      factored: new Float64Array(n * n),
      solved: new Float64Array(n * width),
      miss: new Float64Array(n * width),
      statePivots: new Int32Array(n),
    },
  };
}

/**
 * Computes `response` from `values`; `refined`, at twice the cost, where parts of a milliohm and of gigaohms stand side by side to the last digits too. False
 * when the network is singular (a node without a path).
 */
export function respond(reduction: Reduction, refined: boolean): boolean {
  const { plan, response } = reduction;
  return solveNetwork(reduction, plan, plan.width, plan.states.length, response, refined);
}

/** Computes `rest` from `values`. False when the network is singular (a node that only capacitors reach). */
export function respondAtRest(reduction: Reduction): boolean {
  return solveNetwork(reduction, reduction.plan.rest, DRIVES, 0, reduction.rest, true);
}

/** Solves a network for all its columns, of which `stateColumns` come before the drives, and takes out the rows that matter. */
function solveNetwork(
  { plan, values, work }: Reduction,
  network: RestPlan,
  width: number,
  stateColumns: number,
  rows: Float64Array,
  refined: boolean,
): boolean {
  const { size, matrix } = network;
  const n = plan.states.length;
  work.matrix.fill(0);
  for (let i = 0; i < matrix.target.length; i++) {
    const element = matrix.element[i];
    work.matrix[matrix.target[i]] += matrix.sign[i] * (element < 0 ? 1 : values[element]);
  }
  if (!factor(work.matrix, work.pivots, size)) return false;
  putDrives(network, values, width, stateColumns, work.columns);
  solve(work.matrix, work.pivots, size, work.columns, width);
  if (refined) {
    putDrives(network, values, width, stateColumns, work.missed);
    takeBranches(network, values, width, work.columns, work.missed);
    makeGood(work.matrix, work.pivots, size, work.columns, work.missed, width);
  }
  for (let state = 0; state < n; state++) {
    copyRow(rows, state, work.columns, network.stateRows[state], width);
    subtractRow(rows, state, work.columns, network.stateRowsLess[state], width);
  }
  copyRow(rows, n, work.columns, plan.gate, width);
  subtractRow(rows, n, work.columns, plan.source, width);
  copyRow(rows, n + 1, work.columns, plan.gate, width);
  subtractRow(rows, n + 1, work.columns, plan.drain, width);
  copyRow(rows, n + 2, work.columns, plan.output, width);
  return true;
}

/** Right-hand sides of the network's equations. */
function putDrives({ columns, constants }: RestPlan, values: Float64Array, width: number, stateColumns: number, to: Float64Array): void {
  to.set(columns);
  for (let i = 0; i < constants.target.length; i++) {
    to[constants.target[i] * width + stateColumns + CONSTANT] += constants.sign[i] * values[constants.element[i]];
  }
}

/** Takes the left-hand sides of a solution from the right-hand ones in `from`: the current of a conductance from the difference of its ends, the same at both. */
function takeBranches({ size, branches }: RestPlan, values: Float64Array, width: number, solved: Float64Array, from: Float64Array): void {
  const { bridges, others } = branches;
  for (let i = 0; i < others.target.length; i++) {
    const weight = others.sign[i] * (others.element[i] < 0 ? 1 : values[others.element[i]]);
    const row = Math.floor(others.target[i] / size);
    const unknown = others.target[i] - row * size;
    for (let column = 0; column < width; column++) from[row * width + column] -= weight * solved[unknown * width + column];
  }
  for (let i = 0; i < bridges.length; i += 3) {
    const a = bridges[i] * width;
    const b = bridges[i + 1] * width;
    const conductance = values[bridges[i + 2]];
    for (let column = 0; column < width; column++) {
      const current = conductance * (solved[a + column] - solved[b + column]);
      from[a + column] -= current;
      from[b + column] += current;
    }
  }
}

function copyRow(to: Float64Array, toRow: number, from: Float64Array, fromRow: number, width: number): void {
  for (let i = 0; i < width; i++) to[toRow * width + i] = fromRow < 0 ? 0 : from[fromRow * width + i];
}

function subtractRow(to: Float64Array, toRow: number, from: Float64Array, fromRow: number, width: number): void {
  for (let i = 0; i < width; i++) to[toRow * width + i] -= fromRow < 0 ? 0 : from[fromRow * width + i];
}

/** Computes `memory` and `step` from `response` for steps of `stepSec`. False when singular. */
export function discretise(reduction: Reduction, stepSec: number): boolean {
  const { plan, response, step, memory, work } = reduction;
  const n = plan.states.length;
  const columns = reduction.layout.step;
  const { width } = columns;
  work.left.fill(0);
  work.right.fill(0);
  memory.fill(0);
  addStorage(reduction, stepSec);
  for (let row = 0; row < n; row++) addDrives(reduction, row);
  const { left, right, factored, solved, statePivots } = work;
  factored.set(left);
  if (!factor(factored, statePivots, n)) return false;
  solved.set(right);
  solve(factored, statePivots, n, solved, width);
  refine(left, factored, statePivots, n, right, solved, work.miss, width);
  scaleMemory(reduction, stepSec);
  for (let i = 0; i < n * width; i++) step[2 * width + i] = solved[i];
  for (let port = 0; port < 2; port++) {
    const p = (n + port) * plan.width;
    const to = port * width;
    for (let column = 0; column < width; column++) {
      let sum = 0;
      for (let state = 0; state < n; state++) sum += response[p + state] * solved[state * width + column];
      step[to + column] = sum;
    }
    for (let k = 0; k < 2; k++) step[to + columns.newU + k] += response[p + n + k];
    for (let k = 0; k < PORT_CURRENTS; k++) step[to + columns.newJ + k] += response[p + n + CHANNEL + k];
    step[to + columns.constant] += response[p + n + CONSTANT];
    for (let k = 0; k < plan.noisy.length; k++) step[to + columns.noise + k] += response[p + n + DRIVES + k];
  }
  return true;
}

/**
 * Turns each row's memory from a charge over a step into a voltage (a current), by its own storage: at rest it is then the state itself, and so it is
 * on any line between two sets of coefficients.
 */
function scaleMemory({ plan, values, memory, work }: Reduction, stepSec: number): void {
  const n = plan.states.length;
  const past = memoryColumns(n).width;
  const { width } = stepColumns(n, plan.noisy.length);
  for (let row = 0; row < n; row++) {
    const own = values[plan.states[row].element] / stepSec;
    for (let k = 0; k < past; k++) memory[row * past + k] /= own;
    for (let state = 0; state < n; state++) work.solved[state * width + row] *= own;
  }
}

/** Adds f₁, and f₀ where the row is trapezoidal. Noise is steady over a step. */
function addDrives({ plan, response, memory, work, layout }: Reduction, row: number): void {
  const n = plan.states.length;
  const columns = layout.step;
  const past = layout.memory;
  const isTrapezoidal = row < plan.trapezoidal;
  const weight = isTrapezoidal ? 0.5 : 1;
  const f = row * plan.width;
  const r = row * columns.width;
  const m = row * past.width;
  work.right[r + row] = 1;
  for (let state = 0; state < n; state++) work.left[row * n + state] -= weight * response[f + state];
  for (let k = 0; k < 2; k++) work.right[r + columns.newU + k] += weight * response[f + n + k];
  for (let k = 0; k < PORT_CURRENTS; k++) work.right[r + columns.newJ + k] += weight * response[f + n + CHANNEL + k];
  if (isTrapezoidal) {
    for (let state = 0; state < n; state++) memory[m + state] += 0.5 * response[f + state];
    for (let k = 0; k < 2; k++) memory[m + past.oldU + k] += 0.5 * response[f + n + k];
    for (let k = 0; k < PORT_CURRENTS; k++) memory[m + past.oldJ + k] += 0.5 * response[f + n + CHANNEL + k];
    memory[m + past.constant] += 0.5 * response[f + n + CONSTANT];
  }
  work.right[r + columns.constant] += weight * response[f + n + CONSTANT];
  for (let k = 0; k < plan.noisy.length; k++) work.right[r + columns.noise + k] += response[f + n + DRIVES + k];
}

/** Adds M/h to both sides and Mu/h to the sources' columns. */
function addStorage(reduction: Reduction, stepSec: number): void {
  const { plan, values } = reduction;
  const n = plan.states.length;
  for (let row = 0; row < n; row++) {
    addDerivative(reduction, row, row, values[plan.states[row].element] / stepSec);
    for (let index = 0; index < plan.links.length; index++) {
      const link = plan.links[index];
      const weight = (link.fromStates[row] * values[link.element]) / stepSec;
      if (weight === 0) continue;
      for (let column = 0; column < n; column++) addDerivative(reduction, row, column, weight * link.fromStates[column]);
      addSourceDerivative(reduction, row, link.fromSources, weight);
    }
  }
}

/** Adds `weight` times h times the derivative of a state to a row: by backward differences where both are stiff, else by one difference. */
function addDerivative({ plan, memory, work, layout }: Reduction, row: number, column: number, weight: number): void {
  const n = plan.states.length;
  const isStiff = row >= plan.trapezoidal && column >= plan.trapezoidal;
  work.left[row * n + column] += isStiff ? NEWEST * weight : weight;
  memory[row * layout.memory.width + column] += weight;
}

function addSourceDerivative({ memory, work, layout }: Reduction, row: number, fromSources: Float64Array, weight: number): void {
  const columns = layout.step;
  const past = layout.memory;
  for (let k = 0; k < 2; k++) {
    work.right[row * columns.width + columns.newU + k] -= weight * fromSources[k];
    memory[row * past.width + past.oldU + k] += weight * fromSources[k];
  }
}
