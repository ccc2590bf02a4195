/**
 * What of a circuit does not change with its values: which voltages and currents are the states, where each element stands in the network's
 * matrix, and the memory in which `reduce.ts` works. Made once when a circuit is compiled.
 *
 * The states are the voltages of the capacitors in a spanning forest (sources first, then coupling, then parasitic capacitors) and the currents
 * of the inductors; the voltage of a capacitor that closes a loop is a sum of states and source voltages. Those that are advanced by the
 * trapezoidal rule (coupling capacitors, inductors) come first, the stiff ones after them.
 */
import { type Circuit, circuitShape, type Element, elementNodes, elementValue, GROUND, type Jfet } from './circuit.ts';
import { chooseForest } from './forest.ts';

/**
 * Columns that drive the network besides the states: two sources, the constants, a current along the channel from drain to source, one from gate to drain and
 * one from gate to source. Each is one of its own: the third is the sum of the other two, which behind megohms cancel.
 */
export const AUDIO = 0;
export const CONTROL = 1;
export const CONSTANT = 2;
export const CHANNEL = 3;
export const GATE_DRAIN = 4;
export const GATE_SOURCE = 5;
export const DRIVES = 6;

/** A capacitor or inductor that is a state or closes a loop. */
export interface StoragePlan {
  readonly element: number;
  /** Of a capacitor that closes a loop: its voltage as a sum of states, and of the audio and the control voltage. */
  readonly fromStates: Float64Array;
  readonly fromSources: Float64Array;
}

/** A sum of `sign`·(value of `element`, or 1 where −1) at `target`. */
export interface Stamps {
  readonly target: Int32Array;
  readonly element: Int32Array;
  readonly sign: Float64Array;
}

/** The same sums for what is taken from them exactly: conductances between two nodes apart, whose large part otherwise hides a small one beside it. */
export interface Branches {
  /** Rows of both ends, and the element, one after the other. */
  readonly bridges: Int32Array;
  readonly others: Stamps;
}

export interface Plan {
  readonly shape: string;
  readonly elements: readonly Element[];
  readonly values: Float64Array;
  /** Unknowns of the network: node voltages, then currents of sources, summers and state capacitors. */
  readonly size: number;
  readonly states: readonly StoragePlan[];
  /** What each state and the output are the voltage of, in the letters of kernels/source.ts. */
  readonly voltages: { readonly states: string; readonly output: 'd' | 'x' };
  /** How many of them, the first, are advanced by the trapezoidal rule. */
  readonly trapezoidal: number;
  readonly links: readonly StoragePlan[];
  /** For each state the unknown that is its derivative's drive, and the one taken from it (−1 for none): a capacitor's current, an inductor's voltage. */
  readonly stateRows: Int32Array;
  readonly stateRowsLess: Int32Array;
  readonly matrix: Stamps;
  readonly branches: Branches;
  /** Right-hand sides, `size` × `width`, that do not depend on values; and the constants' column, which does. */
  readonly columns: Float64Array;
  readonly constants: Stamps;
  /** Columns: states, drives, then one noise current for each element of `noisy`. */
  readonly width: number;
  readonly noisy: Int32Array;
  /** The network at rest, where capacitors are open and inductors are wires; its columns are the drives. */
  readonly rest: RestPlan;
  /** Rows of the nodes; −1 is ground. */
  readonly drain: number;
  readonly gate: number;
  readonly source: number;
  readonly output: number;
}

export interface RestPlan {
  readonly size: number;
  readonly matrix: Stamps;
  readonly branches: Branches;
  readonly columns: Float64Array;
  readonly constants: Stamps;
  /** For each state the unknown that it is, and the one taken from it (−1 for none): a capacitor's ends, an inductor's current. */
  readonly stateRows: Int32Array;
  readonly stateRowsLess: Int32Array;
}

interface Places {
  readonly row: (name: string) => number;
  readonly branchOf: ReadonlyMap<number, number>;
  readonly size: number;
}

/** Plans a circuit; with `noise`, every conductance also gets a column for the current of its thermal noise. */
export function planCircuit(circuit: Circuit, noise = false): Plan {
  const { elements, jfet } = circuit;
  const names = new Set([jfet.drain, jfet.gate, jfet.source, circuit.outputNode, ...elements.flatMap(elementNodes)]);
  names.delete('ground');
  const nodes = [...names];
  const row = (name: string) => nodes.indexOf(name);
  const forest = chooseForest(elements, nodes);
  const inductors = elements.flatMap((element, index) => (element.kind === 'inductor' ? [index] : []));
  const branchOf = new Map<number, number>();
  elements.forEach((element, index) => {
    const hasCurrent = element.kind === 'source' || element.kind === 'supply' || element.kind === 'summer' || forest.trees.includes(index);
    if (hasCurrent) branchOf.set(index, nodes.length + branchOf.size);
  });
  const places: Places = { row, branchOf, size: nodes.length + branchOf.size };
  const isStiff = (index: number) => {
    const element = elements[index];
    return element.kind === 'capacitor' && element.role === 'parasitic';
  };
  const stiff = forest.trees.filter(isStiff);
  const smooth = [...forest.trees.filter((index) => !isStiff(index)), ...inductors];
  const stateElements = [...smooth, ...stiff];
  const storage = (index: number): StoragePlan => {
    const { fromTrees, fromSources } = forest.voltageOf(index);
    const fromStates = Float64Array.from(stateElements, (element) => fromTrees[forest.trees.indexOf(element)] ?? 0);
    return { element: index, fromStates, fromSources };
  };
  const noisy = Int32Array.from(noise ? elements.flatMap((element, index) => (element.kind === 'conductance' ? [index] : [])) : []);
  const ends = { drain: row(jfet.drain), gate: row(jfet.gate), source: row(jfet.source), output: row(circuit.outputNode) };
  const width = stateElements.length + DRIVES + noisy.length;
  return {
    shape: circuitShape(circuit),
    elements,
    values: Float64Array.from(elements, elementValue),
    size: places.size,
    states: stateElements.map(storage),
    trapezoidal: smooth.length,
    voltages: {
      states: stateElements.map((index) => letterOf(elements[index], jfet)).join(''),
      output: circuit.outputNode === jfet.drain && jfet.source === GROUND ? 'd' : 'x',
    },
    links: forest.links.map(storage),
    stateRows: Int32Array.from(stateElements, (index) => branchOf.get(index) ?? endRow(elements[index], row, 'a')),
    stateRowsLess: Int32Array.from(stateElements, (index) => (branchOf.has(index) ? -1 : endRow(elements[index], row, 'b'))),
    matrix: stampsOf(matrixStamps(elements, places)),
    branches: branchesOf(elements, places),
    columns: fixedColumns(elements, places, stateElements, noisy, ends, width),
    constants: stampsOf(constantStamps(elements, places)),
    width,
    noisy,
    rest: planRest(elements, nodes, stateElements, ends),
    ...ends,
  };
}

/**
 * `g` gate to source, `m` gate to drain, `x` anything else. A capacitor from drain to source has a row of its own: behind a small load the difference of
 * two overdrives is not exact enough for its current.
 */
function letterOf(element: Element, { drain, gate, source }: Jfet): string {
  if (element.kind !== 'capacitor') return 'x';
  const { a, b } = element;
  if (a !== gate) return 'x';
  if (b === source) return 'g';
  return b === drain ? 'm' : 'x';
}

function planRest(
  elements: readonly Element[],
  nodes: readonly string[],
  stateElements: readonly number[],
  ends: { drain: number; gate: number; source: number },
): RestPlan {
  const row = (name: string) => nodes.indexOf(name);
  const branchOf = new Map<number, number>();
  elements.forEach(({ kind }, index) => {
    const hasCurrent = kind === 'source' || kind === 'supply' || kind === 'summer' || kind === 'inductor';
    if (hasCurrent) branchOf.set(index, nodes.length + branchOf.size);
  });
  const places: Places = { row, branchOf, size: nodes.length + branchOf.size };
  const end = (index: number, which: 'a' | 'b') => {
    const element = elements[index];
    return element.kind === 'capacitor' ? row(element[which]) : -1;
  };
  return {
    size: places.size,
    matrix: stampsOf(matrixStamps(elements, places)),
    branches: branchesOf(elements, places),
    columns: fixedColumns(elements, places, [], new Int32Array(0), ends, DRIVES),
    constants: stampsOf(constantStamps(elements, places)),
    stateRows: Int32Array.from(stateElements, (index) => branchOf.get(index) ?? end(index, 'a')),
    stateRowsLess: Int32Array.from(stateElements, (index) => end(index, 'b')),
  };
}

function endRow(element: Element, row: (name: string) => number, end: 'a' | 'b'): number {
  return element.kind === 'inductor' ? row(element[end]) : -1;
}

type Stamp = [target: number, element: number, sign: number];

function stampsOf(list: readonly Stamp[]): Stamps {
  return {
    target: Int32Array.from(list, (stamp) => stamp[0]),
    element: Int32Array.from(list, (stamp) => stamp[1]),
    sign: Float64Array.from(list, (stamp) => stamp[2]),
  };
}

function matrixStamps(elements: readonly Element[], { row, branchOf, size }: Places): Stamp[] {
  const list: Stamp[] = [];
  const add = (r: number, c: number, element: number, sign: number) => {
    if (r >= 0 && c >= 0) list.push([r * size + c, element, sign]);
  };
  const output = (node: string, branch: number) => {
    add(row(node), branch, -1, 1);
    add(branch, row(node), -1, 1);
  };
  elements.forEach((element, index) => {
    const branch = branchOf.get(index) ?? -1;
    switch (element.kind) {
      case 'source':
      case 'supply':
        output(element.node, branch);
        return;
      case 'summer':
        output(element.output, branch);
        add(branch, row(element.direct), -1, -1);
        add(branch, row(element.plus), index, -1);
        add(branch, row(element.minus), index, 1);
        return;
      case 'transconductance':
        add(row(element.node), row(element.sensed), index, -1);
        return;
      case 'conductance':
        for (const [node, sign] of [[element.a, 1] as const, [element.b, -1] as const]) {
          add(row(node), row(element.a), index, sign);
          add(row(node), row(element.b), index, -sign);
        }
        return;
      case 'capacitor':
      case 'inductor':
        for (const [node, sign] of [[element.a, 1] as const, [element.b, -1] as const]) {
          add(row(node), branch, -1, sign);
          add(branch, row(node), -1, sign);
        }
        return;
      case 'draw':
        return;
    }
  });
  return list;
}

function branchesOf(elements: readonly Element[], places: Places): Branches {
  const isBridge = (element: Element) => element.kind === 'conductance' && places.row(element.a) >= 0 && places.row(element.b) >= 0;
  const bridges = elements.flatMap((element, index) =>
    element.kind === 'conductance' && isBridge(element) ? [places.row(element.a), places.row(element.b), index] : [],
  );
  const others = matrixStamps(elements, places).filter(([, element]) => element < 0 || !isBridge(elements[element]));
  return { bridges: Int32Array.from(bridges), others: stampsOf(others) };
}

/** Right-hand side of the constants: supplies at their branch, drawn currents at their node. */
function constantStamps(elements: readonly Element[], { row, branchOf }: Places): Stamp[] {
  return elements.flatMap((element, index): Stamp[] => {
    if (element.kind === 'supply') return [[branchOf.get(index) as number, index, 1]];
    if (element.kind === 'draw') return [[row(element.node), index, -1]];
    return [];
  });
}

function fixedColumns(
  elements: readonly Element[],
  { row, branchOf, size }: Places,
  stateElements: readonly number[],
  noisy: Int32Array,
  ends: { drain: number; gate: number; source: number },
  width: number,
): Float64Array {
  const n = stateElements.length;
  const columns = new Float64Array(size * width);
  const add = (r: number, column: number, value: number) => {
    if (r >= 0) columns[r * width + column] += value;
  };
  /** A current that leaves the network at `from` and comes back at `to`. */
  const current = (from: number, to: number, column: number) => {
    add(from, column, -1);
    add(to, column, 1);
  };
  elements.forEach((element, index) => {
    if (element.kind === 'source') add(branchOf.get(index) as number, n + (element.drive === 'audio' ? AUDIO : CONTROL), 1);
  });
  stateElements.forEach((index, state) => {
    const element = elements[index];
    if (element.kind === 'inductor') current(row(element.a), row(element.b), state);
    else add(branchOf.get(index) as number, state, 1);
  });
  current(ends.drain, ends.source, n + CHANNEL);
  current(ends.gate, ends.drain, n + GATE_DRAIN);
  current(ends.gate, ends.source, n + GATE_SOURCE);
  noisy.forEach((index, k) => {
    const element = elements[index];
    if (element.kind === 'conductance') current(row(element.a), row(element.b), n + DRIVES + k);
  });
  return columns;
}
