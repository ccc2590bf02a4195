/**
 * What of a circuit does not change with its values: which capacitor voltages are the states, where each element stands in the network's
 * matrix, and the memory in which `reduce.ts` works. Made once when a circuit is compiled.
 *
 * The states are the voltages of the capacitors in a spanning forest (sources first, then coupling, then parasitic capacitors); the voltage
 * of a capacitor that closes a loop is a sum of states and source voltages.
 */
import { type Circuit, circuitShape, type Element, elementValue, GROUND } from './circuit.ts';

/** Columns that drive the network besides the states: two sources, a constant, and the two port currents of the FET. */
export const AUDIO = 0;
export const CONTROL = 1;
export const GATE_SOURCE = 2;
export const GATE_DRAIN = 3;
export const DRIVES = 4;

export interface CapacitorPlan {
  readonly element: number;
  /** Weight of the new derivative: ½ trapezoidal, 1 backward Euler. */
  readonly newWeight: number;
  /** Its voltage as a sum of states (then of the audio and the control voltage). */
  readonly fromStates: Float64Array;
  readonly fromSources: Float64Array;
}

export interface Plan {
  readonly shape: string;
  readonly elements: readonly Element[];
  readonly values: Float64Array;
  /** Unknowns of the network: node voltages, then currents of sources, summers and state capacitors. */
  readonly size: number;
  /** State capacitors, in the order of the states; the row of each one's current; then those that close loops. */
  readonly states: readonly CapacitorPlan[];
  readonly stateRows: Int32Array;
  readonly links: readonly CapacitorPlan[];
  /** The matrix as a sum of `sign`·(value of `element`, or 1 where −1) at `target`. */
  readonly stamps: { readonly target: Int32Array; readonly element: Int32Array; readonly sign: Float64Array };
  /** Right-hand sides, `size` × (states + DRIVES). */
  readonly columns: Float64Array;
  /** Rows of the nodes; −1 is ground. */
  readonly drain: number;
  readonly gate: number;
  readonly source: number;
  readonly output: number;
}

interface Reach {
  readonly root: string;
  readonly states: Map<number, number>;
  readonly sources: [number, number];
}

/** Plans a circuit. Throws a RangeError when a node is driven twice. */
export function planCircuit(circuit: Circuit): Plan {
  const { elements, jfet } = circuit;
  const nodes = nodeNames(circuit);
  const row = (name: string) => nodes.indexOf(name);
  const chosen = chooseStates(circuit, nodes);
  const branchOf = new Map<number, number>();
  elements.forEach((element, index) => {
    const hasCurrent = element.kind === 'source' || element.kind === 'summer' || chosen.trees.includes(index);
    if (hasCurrent) branchOf.set(index, nodes.length + branchOf.size);
  });
  const size = nodes.length + branchOf.size;
  const capacitorPlan = (index: number): CapacitorPlan => {
    const element = elements[index] as Extract<Element, { kind: 'capacitor' }>;
    return { element: index, newWeight: element.role === 'coupling' ? 0.5 : 1, ...chosen.voltageOf(index) };
  };
  const stateRows = Int32Array.from(chosen.trees, (index) => branchOf.get(index) as number);
  const ends = { drain: row(jfet.drain), gate: row(jfet.gate), source: row(jfet.source), output: row(circuit.outputNode) };
  return {
    shape: circuitShape(circuit),
    elements,
    values: Float64Array.from(elements, elementValue),
    size,
    states: chosen.trees.map(capacitorPlan),
    stateRows,
    links: chosen.links.map(capacitorPlan),
    stamps: matrixStamps(elements, row, branchOf, size),
    columns: driveColumns(elements, branchOf, stateRows, ends, size),
    ...ends,
  };
}

function matrixStamps(elements: readonly Element[], row: (name: string) => number, branchOf: ReadonlyMap<number, number>, size: number) {
  const list: [number, number, number][] = [];
  const add = (r: number, c: number, element: number, sign: number) => {
    if (r >= 0 && c >= 0) list.push([r * size + c, element, sign]);
  };
  elements.forEach((element, index) => {
    const branch = branchOf.get(index) ?? -1;
    if (element.kind === 'source' || element.kind === 'summer') {
      const output = row(element.kind === 'source' ? element.node : element.output);
      add(output, branch, -1, 1);
      add(branch, output, -1, 1);
      if (element.kind === 'summer') {
        add(branch, row(element.direct), -1, -1);
        add(branch, row(element.scaled), index, -1);
      }
      return;
    }
    const ends: [number, number][] = [
      [row(element.a), 1],
      [row(element.b), -1],
    ];
    for (const [node, sign] of ends) {
      add(node, branch, -1, sign);
      add(branch, node, -1, sign);
      if (element.kind === 'conductance') for (const [other, otherSign] of ends) add(node, other, index, sign * otherSign);
    }
  });
  return {
    target: Int32Array.from(list, (entry) => entry[0]),
    element: Int32Array.from(list, (entry) => entry[1]),
    sign: Float64Array.from(list, (entry) => entry[2]),
  };
}

function driveColumns(
  elements: readonly Element[],
  branchOf: ReadonlyMap<number, number>,
  stateRows: Int32Array,
  ends: { drain: number; gate: number; source: number },
  size: number,
): Float64Array {
  const n = stateRows.length;
  const width = n + DRIVES;
  const columns = new Float64Array(size * width);
  const add = (r: number, column: number, value: number) => {
    if (r >= 0) columns[r * width + column] += value;
  };
  elements.forEach((element, index) => {
    if (element.kind === 'source') add(branchOf.get(index) as number, n + (element.drive === 'audio' ? AUDIO : CONTROL), 1);
  });
  stateRows.forEach((r, state) => {
    add(r, state, 1);
  });
  add(ends.gate, n + GATE_SOURCE, -1);
  add(ends.source, n + GATE_SOURCE, 1);
  add(ends.gate, n + GATE_DRAIN, -1);
  add(ends.drain, n + GATE_DRAIN, 1);
  return columns;
}

function nodeNames(circuit: Circuit): string[] {
  const names = new Set<string>([circuit.jfet.drain, circuit.jfet.gate, circuit.jfet.source, circuit.outputNode]);
  for (const element of circuit.elements) {
    if (element.kind === 'source') names.add(element.node);
    else if (element.kind === 'summer') for (const name of [element.output, element.direct, element.scaled]) names.add(name);
    else for (const name of [element.a, element.b]) names.add(name);
  }
  names.delete(GROUND);
  return [...names];
}

/** A spanning forest over sources and capacitors: each node's voltage as the voltage of its root plus states and source voltages. */
function chooseStates(circuit: Circuit, nodes: readonly string[]) {
  const { elements } = circuit;
  const reach = new Map<string, Reach>();
  for (const name of [GROUND, ...nodes]) reach.set(name, { root: name, states: new Map(), sources: [0, 0] });
  for (const element of elements) {
    if (element.kind !== 'source') continue;
    const there = reach.get(element.node) as Reach;
    if (there.root === GROUND) throw new RangeError(`node ${element.node} is driven twice; expected one source for each node`);
    reach.set(element.node, { root: GROUND, states: new Map(), sources: element.drive === 'audio' ? [1, 0] : [0, 1] });
  }
  const order = ['coupling', 'parasitic'].flatMap((role) =>
    elements.flatMap((element, index) => (element.kind === 'capacitor' && element.role === role ? [index] : [])),
  );
  const trees: number[] = [];
  const links: number[] = [];
  for (const index of order) {
    const { a, b } = elements[index] as Extract<Element, { kind: 'capacitor' }>;
    const from = reach.get(a) as Reach;
    const to = reach.get(b) as Reach;
    if (from.root === to.root) {
      links.push(index);
      continue;
    }
    trees.push(index);
    join(reach, from, to, trees.length - 1);
  }
  const voltageOf = (index: number) => {
    const { a, b } = elements[index] as Extract<Element, { kind: 'capacitor' }>;
    const from = reach.get(a) as Reach;
    const to = reach.get(b) as Reach;
    const fromStates = new Float64Array(trees.length);
    for (const [state, sign] of from.states) fromStates[state] += sign;
    for (const [state, sign] of to.states) fromStates[state] -= sign;
    return { fromStates, fromSources: Float64Array.of(from.sources[0] - to.sources[0], from.sources[1] - to.sources[1]) };
  };
  return { trees, links, voltageOf };
}

/** Hangs one tree on the other by the new state, whose voltage is v(from) − v(to). Ground stays a root. */
function join(reach: Map<string, Reach>, from: Reach, to: Reach, state: number): void {
  const fromHangs = to.root === GROUND || from.root !== GROUND;
  const hanging = fromHangs ? from : to;
  const fixed = fromHangs ? to : from;
  const sign = fromHangs ? 1 : -1;
  const moved = hanging.root;
  for (const [name, old] of reach) {
    if (old.root !== moved) continue;
    const states = new Map(old.states);
    const add = (key: number, amount: number) => states.set(key, (states.get(key) ?? 0) + amount);
    for (const [key, value] of fixed.states) add(key, value);
    for (const [key, value] of hanging.states) add(key, -value);
    add(state, sign);
    const sources: [number, number] = [
      old.sources[0] + fixed.sources[0] - hanging.sources[0],
      old.sources[1] + fixed.sources[1] - hanging.sources[1],
    ];
    reach.set(name, { root: fixed.root, states, sources });
  }
}
