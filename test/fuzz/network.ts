/**
 * Kirchhoff's laws for a circuit, assembled from its list of elements anew and solved in 32 digits: nothing here is shared with the solver but the
 * list, the choice of states and the scheme's weights.
 *
 * Law      state capacitors hold their voltage, state inductors their current, the other capacitors (links) are open. All node voltages and branch
 *          currents follow, for any audio, control and pair of currents gate-source and gate-drain
 */
import type { Element } from '../../model/cell/circuit.ts';
import { elementNodes } from '../../model/cell/circuit.ts';
import { addNumber, addProduct, solveTwofold } from './twofold.ts';

/** Columns after the states: what else drives the network. */
export const AUDIO = 0;
export const CONTROL = 1;
export const CONSTANT = 2;
export const GATE_SOURCE = 3;
export const GATE_DRAIN = 4;
export const DRIVES = 5;

/** Rows: what drives each state (capacitor current, inductor voltage), gate-source voltage, gate-drain voltage, output, the links' voltages. */
export interface Network {
  readonly states: number;
  readonly links: number;
  /** Columns: states, then drives. */
  readonly width: number;
  readonly rows: Float64Array;
  /** Rows of plain doubles: the currents of the resistors and of the control's draw at the FET's three nodes, A. */
  readonly currents: readonly Float64Array[];
  /** Of a voltage at every node, what the output gains where each conductance there is wrong by all of itself: Σ |Z|·G over the nodes. */
  readonly outputSpread: number;
  /** Capacitance or inductance of each state and of each link. */
  readonly stored: Float64Array;
}

export interface NetworkOf {
  readonly elements: readonly Element[];
  /** The elements' values in force. */
  readonly values: Float64Array;
  readonly jfet: { readonly drain: string; readonly gate: string; readonly source: string };
  readonly outputNode: string;
  readonly stateElements: readonly number[];
}

export function solveNetwork({ elements, values, jfet, outputNode, stateElements }: NetworkOf): Network {
  const nodes = [...new Set([jfet.drain, jfet.gate, jfet.source, outputNode, ...elements.flatMap(elementNodes)])].filter(
    (name) => name !== 'ground',
  );
  const at = (name: string) => nodes.indexOf(name);
  const links = elements.flatMap((element, i) => (element.kind === 'capacitor' && !stateElements.includes(i) ? [i] : []));
  const withCurrent = elements.flatMap((element, i) =>
    element.kind === 'source' ||
    element.kind === 'supply' ||
    element.kind === 'summer' ||
    (element.kind === 'capacitor' && stateElements.includes(i))
      ? [i]
      : [],
  );
  const branch = (i: number) => nodes.length + withCurrent.indexOf(i);
  const size = nodes.length + withCurrent.length;
  const n = stateElements.length;
  const width = n + DRIVES;
  const matrix = new Float64Array(2 * size * size);
  const right = new Float64Array(2 * size * width);
  const put = (row: number, column: number, value: number) => {
    if (row >= 0 && column >= 0) addNumber(matrix, row * size + column, value);
  };
  const inject = (row: number, column: number, value: number) => {
    if (row >= 0) addNumber(right, row * width + column, value);
  };
  /** A current that leaves one node and enters another, given by a column. */
  const carry = (from: string, to: string, column: number) => {
    inject(at(from), column, -1);
    inject(at(to), column, 1);
  };
  elements.forEach((element, i) => {
    const value = values[i];
    switch (element.kind) {
      case 'conductance':
        put(at(element.a), at(element.a), value);
        put(at(element.b), at(element.b), value);
        put(at(element.a), at(element.b), -value);
        put(at(element.b), at(element.a), -value);
        return;
      case 'transconductance':
        put(at(element.node), at(element.sensed), -value);
        return;
      case 'draw':
        inject(at(element.node), n + CONSTANT, -value);
        return;
      case 'source':
      case 'supply':
        put(at(element.node), branch(i), 1);
        put(branch(i), at(element.node), 1);
        if (element.kind === 'supply') inject(branch(i), n + CONSTANT, value);
        else inject(branch(i), n + (element.drive === 'audio' ? AUDIO : CONTROL), 1);
        return;
      case 'summer':
        put(at(element.output), branch(i), 1);
        put(branch(i), at(element.output), 1);
        put(branch(i), at(element.direct), -1);
        put(branch(i), at(element.plus), -value);
        put(branch(i), at(element.minus), value);
        return;
      case 'inductor':
        carry(element.a, element.b, stateElements.indexOf(i));
        return;
      case 'capacitor':
        if (links.includes(i)) return;
        put(at(element.a), branch(i), 1);
        put(at(element.b), branch(i), -1);
        put(branch(i), at(element.a), 1);
        put(branch(i), at(element.b), -1);
        inject(branch(i), stateElements.indexOf(i), 1);
        return;
    }
  });
  carry(jfet.gate, jfet.source, n + GATE_SOURCE);
  carry(jfet.gate, jfet.drain, n + GATE_DRAIN);
  const outputSpread = spreadTo(at(outputNode), matrix, size, nodes.length);
  if (!solveTwofold(matrix, size, right, width)) throw new Error('the network is singular');
  const rows = new Float64Array(2 * (n + 3 + links.length) * width);
  const one = Float64Array.of(1, 0);
  const take = (row: number, unknown: number, sign: number) => {
    if (unknown < 0) return;
    for (let c = 0; c < width; c++) addProduct(rows, row * width + c, sign, right, unknown * width + c, one, 0);
  };
  const across = (row: number, a: string, b: string) => {
    take(row, at(a), 1);
    take(row, at(b), -1);
  };
  stateElements.forEach((i, state) => {
    const element = elements[i];
    if (element.kind === 'inductor') across(state, element.a, element.b);
    else take(state, branch(i), 1);
  });
  across(n, jfet.gate, jfet.source);
  across(n + 1, jfet.gate, jfet.drain);
  take(n + 2, at(outputNode), 1);
  links.forEach((i, k) => {
    const element = elements[i];
    if (element.kind === 'capacitor') across(n + 3 + k, element.a, element.b);
  });
  const currents = elements.flatMap((element, i) => {
    if (element.kind !== 'conductance' && element.kind !== 'transconductance') return [];
    const [from, to] = element.kind === 'conductance' ? [element.a, element.b] : [element.sensed, 'ground'];
    const node = element.kind === 'conductance' ? [element.a, element.b] : [element.node];
    if (!node.some((name) => [jfet.drain, jfet.gate, jfet.source].includes(name))) return [];
    const voltage = (name: string, c: number) => (at(name) < 0 ? 0 : right[2 * (at(name) * width + c)]);
    return [Float64Array.from({ length: width }, (_, c) => values[i] * (voltage(from, c) - voltage(to, c)))];
  });
  return {
    states: n,
    links: links.length,
    width,
    rows,
    currents,
    outputSpread,
    stored: Float64Array.from([...stateElements, ...links], (i) => values[i]),
  };
}

/** Transfer impedances from every node to one, which are a row of the inverse, times what the node's own conductances add up to. */
function spreadTo(output: number, matrix: Float64Array, size: number, nodes: number): number {
  if (output < 0) return 0;
  const transposed = new Float64Array(matrix.length);
  for (let i = 0; i < size; i++) {
    for (let k = 0; k < size; k++)
      for (let part = 0; part < 2; part++) transposed[2 * (k * size + i) + part] = matrix[2 * (i * size + k) + part];
  }
  const row = new Float64Array(2 * size);
  row[2 * output] = 1;
  if (!solveTwofold(transposed, size, row, 1)) return 0;
  let sum = 0;
  for (let i = 0; i < nodes; i++) sum += Math.abs(row[2 * i] * matrix[2 * (i * size + i)]);
  return sum;
}
