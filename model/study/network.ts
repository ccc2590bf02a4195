/**
 * A circuit in the frequency domain, its FET replaced by slopes: who moves what, and by how much.
 *
 * Law      nodal equations with a branch current for every source, summer and inductor; channel i = sourceS·vgs − drainS·vgd, each junction a
 *          conductance
 * Scheme   the transposed system is solved once for one observed quantity; its solution holds the effect of every source and every injected
 *          current on it
 * Error    of the linear solution, returned with it (`complex.ts`)
 * Valid    any frequency from 0 Hz; signals small enough that slopes stand for the device
 * Source   modified nodal analysis: Ho, Ruehli & Brennan, IEEE Trans. Circuits Syst. 22 (1975) 504; adjoint network: Director & Rohrer,
 *          IEEE Trans. Circuit Theory 16 (1969) 318 (both from memory)
 */
import { type Circuit, type Element, elementNodes, GROUND } from '../cell/circuit.ts';
import { type Complex, type ComplexArray, complexArray, difference, type Solution, solveComplex, ZERO } from './complex.ts';

const TURN = 6.283185307179586;

/** Slopes of the FET, S: of the channel current by vgs and, falling, by vgd; of the junctions from gate to source (with the clamp) and to drain. */
export interface Slopes {
  readonly sourceS: number;
  readonly drainS: number;
  readonly gateSourceS: number;
  readonly gateDrainS: number;
}

export const NO_SLOPES: Slopes = { sourceS: 0, drainS: 0, gateSourceS: 0, gateDrainS: 0 };

export interface Network {
  readonly circuit: Circuit;
  readonly slopes: Slopes;
  /** Unknowns: the nodes' voltages, then the currents of the elements in `branchOf`, from the element's node into it. */
  readonly nodes: readonly string[];
  readonly branchOf: ReadonlyMap<Element, number>;
  readonly size: number;
}

export function createNetwork(circuit: Circuit, slopes: Slopes): Network {
  const { drain, gate, source } = circuit.jfet;
  const names = new Set([drain, gate, source, circuit.outputNode, ...circuit.elements.flatMap(elementNodes)]);
  names.delete(GROUND);
  const nodes = [...names];
  const branchOf = new Map<Element, number>();
  for (const element of circuit.elements) {
    if (['source', 'supply', 'summer', 'inductor'].includes(element.kind)) branchOf.set(element, nodes.length + branchOf.size);
  }
  return { circuit, slopes, nodes, branchOf, size: nodes.length + branchOf.size };
}

/** What each source and each current does to one observed quantity, at one frequency. */
export interface Effects {
  /** By 1 V of a driven source; zero where the circuit has none. */
  ofDrive(drive: 'audio' | 'control'): Complex;
  /** By 1 A that leaves the network at `from` and comes back at `to`: Ω where a voltage is observed. */
  ofCurrent(from: string, to: string): Complex;
  readonly errorRatio: number;
}

/** The observed quantity: the voltage of `plus` less that of `minus`, or the current that a driven source delivers. */
export type Observed = { readonly plus: string; readonly minus: string } | { readonly delivers: 'audio' | 'control' };

/** Throws a RangeError when a node has no path to ground at this frequency. */
export function effectsOn(network: Network, frequencyHz: number, observed: Observed): Effects {
  const row = rowsOf(network);
  const right = complexArray(network.size);
  const add = (at: number, value: number) => {
    if (at >= 0) right.re[at] += value;
  };
  if ('delivers' in observed) add(branchOfDrive(network, observed.delivers), -1);
  else {
    add(row(observed.plus), 1);
    add(row(observed.minus), -1);
  }
  const { x, errorRatio } = solved(matrixAt(network, frequencyHz, true), right, frequencyHz);
  const at = (index: number): Complex => (index < 0 ? ZERO : { re: x.re[index], im: x.im[index] });
  return {
    errorRatio,
    ofDrive: (drive) => at(branchOfDrive(network, drive)),
    ofCurrent: (from, to) => difference(at(row(to)), at(row(from))),
  };
}

/** A steady current, A, that leaves at `from` and comes back at `to`. */
export interface SteadyCurrent {
  readonly from: string;
  readonly to: string;
  readonly valueA: number;
}

/** Direct voltages of the nodes by name, V, under steady drives, the circuit's own supplies and the given currents. */
export function steadyVoltages(
  network: Network,
  drives: Readonly<Record<'audio' | 'control', number>>,
  currents: readonly SteadyCurrent[],
): Readonly<Record<string, number>> {
  const row = rowsOf(network);
  const right = complexArray(network.size);
  const inject = (from: string, to: string, valueA: number) => {
    if (row(from) >= 0) right.re[row(from)] -= valueA;
    if (row(to) >= 0) right.re[row(to)] += valueA;
  };
  for (const element of network.circuit.elements) {
    const branch = network.branchOf.get(element) ?? -1;
    if (element.kind === 'source') right.re[branch] = drives[element.drive];
    if (element.kind === 'supply') right.re[branch] = element.valueV;
    if (element.kind === 'draw') inject(element.node, GROUND, element.valueA);
  }
  for (const { from, to, valueA } of currents) inject(from, to, valueA);
  const { x } = solved(matrixAt(network, 0, false), right, 0);
  return { [GROUND]: 0, ...Object.fromEntries(network.nodes.map((name, index) => [name, x.re[index]])) };
}

function rowsOf({ nodes }: Network): (name: string) => number {
  return (name) => nodes.indexOf(name);
}

function branchOfDrive({ branchOf }: Network, drive: 'audio' | 'control'): number {
  for (const [element, branch] of branchOf) if (element.kind === 'source' && element.drive === drive) return branch;
  return -1;
}

function solved(matrix: ComplexArray, right: ComplexArray, frequencyHz: number): Solution {
  const solution = solveComplex(matrix, right);
  if (solution === null)
    throw new RangeError(`the circuit has a node without a path to ground at ${frequencyHz} Hz; expected one for every node`);
  return solution;
}

function matrixAt(network: Network, frequencyHz: number, transposed: boolean): ComplexArray {
  const { size, circuit, branchOf, slopes } = network;
  const matrix = complexArray(size * size);
  const row = rowsOf(network);
  const omega = TURN * frequencyHz;
  const add = (equation: number, unknown: number, re: number, im = 0) => {
    if (equation < 0 || unknown < 0) return;
    const at = transposed ? unknown * size + equation : equation * size + unknown;
    matrix.re[at] += re;
    matrix.im[at] += im;
  };
  /** A current from `from` to `to` that `plus` less `minus` controls. */
  const transfer = (from: string, to: string, plus: string, minus: string, re: number, im = 0) => {
    for (const [node, sign] of [[from, 1] as const, [to, -1] as const]) {
      add(row(node), row(plus), sign * re, sign * im);
      add(row(node), row(minus), -sign * re, -sign * im);
    }
  };
  for (const element of circuit.elements) stampElement(element, branchOf.get(element) ?? -1, omega, row, add, transfer);
  const { drain, gate, source } = circuit.jfet;
  transfer(drain, source, gate, source, slopes.sourceS);
  transfer(drain, source, gate, drain, -slopes.drainS);
  transfer(gate, source, gate, source, slopes.gateSourceS);
  transfer(gate, drain, gate, drain, slopes.gateDrainS);
  return matrix;
}

function stampElement(
  element: Element,
  branch: number,
  omega: number,
  row: (name: string) => number,
  add: (equation: number, unknown: number, re: number, im?: number) => void,
  transfer: (from: string, to: string, plus: string, minus: string, re: number, im?: number) => void,
): void {
  switch (element.kind) {
    case 'conductance':
      transfer(element.a, element.b, element.a, element.b, element.valueS);
      return;
    case 'capacitor':
      transfer(element.a, element.b, element.a, element.b, 0, omega * element.valueF);
      return;
    case 'transconductance':
      transfer(GROUND, element.node, element.sensed, GROUND, element.valueS);
      return;
    case 'inductor':
      for (const [node, sign] of [[element.a, 1] as const, [element.b, -1] as const]) {
        add(row(node), branch, sign);
        add(branch, row(node), sign);
      }
      add(branch, branch, 0, -omega * element.valueH);
      return;
    case 'source':
    case 'supply':
      add(row(element.node), branch, 1);
      add(branch, row(element.node), 1);
      return;
    case 'summer':
      add(row(element.output), branch, 1);
      add(branch, row(element.output), 1);
      add(branch, row(element.direct), -1);
      add(branch, row(element.plus), -element.fraction);
      add(branch, row(element.minus), element.fraction);
      return;
    case 'draw':
      return;
  }
}
