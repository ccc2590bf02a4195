/**
 * A witness beside a running cell: rebuilds every current of a solved sample from the circuit, the laws of the device and the scheme's weights, in
 * 32 digits, and says by how much Kirchhoff's current law is missed.
 *
 * Device   the currents that the cell reports, less those of the laws at the voltages that it reports, A
 * Ports    what the network delivers at the port voltages that the cell reports, less what the device draws there, A
 * States   the row of each state capacitor (step.ts), A; of each inductor, V
 * Output   the voltage of the output node, V
 * Floor    the number format's: matrices and voltages are kept to half an ulp, which leaves ε·G·V at a node, G the largest conductance in the circuit
 *          (resistors, C/h) and V its largest voltage (L/h times the current of an inductor counts), and ε·|A|·|A⁻¹|·|r| in a row of the step, whose
 *          solution is A⁻¹·r. The output misses Σ ε·|Z|·G·V over the nodes, Z from there to it: behind megohms it sees a loop of 1 Ω that floats
 *          beside it. 1e-13 A for 1 S and 10 V; more where milliohms and picofarads stand in one loop
 */
import type { Cell } from '../../model/cell/cell.ts';
import type { Circuit } from '../../model/cell/circuit.ts';
import * as L from '../../model/cell/kernels/layout.ts';
import { channelTerm, type LawConstants } from '../../model/device/law.ts';
import { AUDIO, CONSTANT, CONTROL, DRIVES, GATE_DRAIN, GATE_SOURCE, type Network, solveNetwork } from './network.ts';
import { knownPlaces, type Step, stepOf } from './step.ts';
import { addNumber, addProduct } from './twofold.ts';

/** Half an ulp of 1, times the roundings that eliminating two dozen unknowns adds up, about. */
const ROUNDING = 64 * 2 ** -53;

/** Of the largest voltage: what the output may miss besides, by rounding in branches that are no conductances. */
const OUTPUT_SHARE = 1e-11;
/** Of the smooth law's table, in its own unit: its pieces are polynomials of degree 5 over 1/8, f⁽⁶⁾/6!·(1/16)⁶/2⁵, f⁽⁶⁾ up to 4.42 at Q = 3 (mpmath). */
const TABLE_ERROR = 4.42 / 720 / 16 ** 6 / 32;

export type Place = 'channel' | 'source junction' | 'drain junction' | 'gate-source' | 'gate-drain' | 'capacitor' | 'inductor' | 'output';

/** A residual with what it is judged by: the largest current of the device or element there, and the number format's floor. */
export interface Residual {
  readonly where: Place;
  readonly value: number;
  readonly currents: number;
  readonly floor: number;
}

/** In the n-channel frame. */
interface Drawn {
  readonly channel: number;
  /** Forward currents above the reverse current, gate-source with the clamp, gate-drain. */
  readonly source: number;
  readonly drain: number;
  readonly vgs: number;
  readonly vgd: number;
  readonly gateOffV: number;
  /** Currents of the two ports. */
  readonly ports: readonly [number, number];
  readonly currents: number;
  /** Of the channel and the junctions, forward and reverse, one by one. */
  readonly gross: number;
  readonly channelFloor: number;
  readonly junctionRounding: number;
}

export class Witness {
  private network: Network;
  private step: Step;
  private readonly old: Float64Array;
  private readonly known: Float64Array;
  private readonly cell: Cell;
  private readonly circuit: Circuit;

  constructor(cell: Cell, circuit: Circuit) {
    this.cell = cell;
    this.circuit = circuit;
    this.old = new Float64Array(cell.state.length);
    this.network = this.solve();
    this.step = stepOf(this.network, cell.numbers.plan.trapezoidal, cell.stepSec);
    this.known = new Float64Array(2 * knownPlaces(cell.stateCount).width);
  }

  /** After the cell's values have moved. */
  refresh(): void {
    this.network = this.solve();
    this.step = stepOf(this.network, this.cell.numbers.plan.trapezoidal, this.cell.stepSec);
  }

  /**
   * Whether the network only takes from its ports. A buffer and a stray capacitance together may feed the drain back to itself, and then nothing bounds
   * the drain but the buffer's supply, which the circuit does not know.
   */
  isPassive(): boolean {
    const { ports } = this.step;
    const { width, newJ } = knownPlaces(this.cell.stateCount);
    const z = (port: number, k: number) => ports[2 * (port * width + newJ + k)];
    return z(0, 0) <= 0 && z(1, 1) <= 0 && z(0, 0) + z(1, 1) - z(0, 1) - z(1, 0) <= 0;
  }

  /** Before a sample. */
  remember(): void {
    this.old.set(this.cell.state);
  }

  /** After the sample that was solved for these inputs and gave this output. */
  residuals(audioV: number, controlV: number, outputV: number): Residual[] {
    const drawn = this.drawn();
    this.fillKnown(audioV, controlV);
    const currents = this.currentsAtNodes(drawn.currents);
    const states = this.stateResiduals(currents, drawn.gross);
    const floors = states.map((state) => state.floor);
    return [
      ...this.deviceResiduals(drawn, currents),
      ...this.portResiduals(drawn, currents, floors),
      ...states,
      this.outputResidual(outputV),
    ];
  }

  private solve(): Network {
    const { plan } = this.cell.numbers;
    return solveNetwork({
      elements: plan.elements,
      values: this.cell.values,
      jfet: this.circuit.jfet,
      outputNode: this.circuit.outputNode,
      stateElements: plan.states.map((state) => state.element),
    });
  }

  /** Movable values of the device, in the order in which compileCell keeps them. */
  private device() {
    const { law, exponent, plan } = this.cell.numbers;
    const [scale, gateOffV, reverseA, nVtV, lambdaPerV, widthV, clampA, clampNVtV] = this.cell.values.subarray(plan.values.length);
    const constants: LawConstants = { law, scale, gateOffV, depletionV: widthV, tailV: widthV, exponent };
    return { constants, reverseA, nVtV, lambdaPerV, clampA, clampNVtV };
  }

  /** Currents of the two ports as the cell reports them in `state`, A. */
  private portCurrents(state: Float64Array): [number, number] {
    const { slots, numbers } = this.cell;
    const { reverseA, clampA } = this.device();
    const channel = state[slots + L.CHANNEL_A];
    const source = channel + state[slots + L.JUNCTION_S] - reverseA - clampA;
    return [numbers.polarity * source, numbers.polarity * (state[slots + L.JUNCTION_D] - channel - reverseA)];
  }

  /** What the device draws by its laws at the overdrives that the cell reports. */
  private drawn(): Drawn {
    const { state, slots, numbers } = this.cell;
    const { constants, reverseA, nVtV, lambdaPerV, clampA, clampNVtV } = this.device();
    const s = state[slots + L.OVERDRIVE_S];
    const d = state[slots + L.OVERDRIVE_D];
    const none = channelTerm(constants, Number.NEGATIVE_INFINITY);
    const term = (v: number, other: number) => (channelTerm(constants, v) - none) * (1 + lambdaPerV * Math.max(0, -other));
    const vgs = s + constants.gateOffV;
    const vgd = d + constants.gateOffV;
    const clamp = clampA > 0 ? clampA * Math.exp(vgs / clampNVtV) : 0;
    const source = (reverseA > 0 ? reverseA * Math.exp(vgs / nVtV) : 0) + clamp;
    const drain = reverseA > 0 ? reverseA * Math.exp(vgd / nVtV) : 0;
    const Fs = term(s, d);
    const Fd = term(d, s);
    const bit = ROUNDING * (Math.abs(vgs) + Math.abs(vgd) + Math.abs(constants.gateOffV));
    const steepest = channelTerm(constants, Math.max(s, d) + bit) - channelTerm(constants, Math.max(s, d) - bit);
    // Of both ends' terms.
    const tableA = numbers.law === 'smooth' ? 2 * TABLE_ERROR * constants.scale : 0;
    const past = 1 + lambdaPerV * Math.max(0, -s, -d);
    return {
      channel: Fs - Fd,
      source,
      drain,
      vgs,
      vgd,
      gateOffV: constants.gateOffV,
      ports: [numbers.polarity * (Fs - Fd + source - reverseA - clampA), numbers.polarity * (drain - Fs + Fd - reverseA)],
      currents: Math.max(Math.abs(Fs - Fd), source, drain),
      gross: Math.abs(Fs - Fd) + source + drain + 2 * reverseA + clampA,
      channelFloor: ROUNDING * (Math.abs(Fs) + Math.abs(Fd) + Math.abs(none) * past) + (steepest + tableA) * past,
      junctionRounding: bit / Math.min(nVtV, clampNVtV),
    };
  }

  private deviceResiduals(drawn: Drawn, currents: number): Residual[] {
    const { state, slots } = this.cell;
    const { junctionRounding } = drawn;
    return [
      { where: 'channel', value: state[slots + L.CHANNEL_A] - drawn.channel, currents, floor: drawn.channelFloor },
      { where: 'source junction', value: state[slots + L.JUNCTION_S] - drawn.source, currents, floor: junctionRounding * drawn.source },
      { where: 'drain junction', value: state[slots + L.JUNCTION_D] - drawn.drain, currents, floor: junctionRounding * drawn.drain },
    ];
  }

  /** What the step knows, with the currents that the cell reports. */
  private fillKnown(audioV: number, controlV: number): void {
    const { cell, old, known } = this;
    const n = cell.stateCount;
    const { trapezoidal } = cell.numbers.plan;
    const stiff = n - trapezoidal;
    const at = knownPlaces(n);
    const set = (i: number, value: number) => {
      known[2 * i] = value;
    };
    for (let k = 0; k < n; k++) set(k, old[k]);
    for (let k = 0; k < stiff; k++) {
      const [x0, x1, x2, x3] = [old[trapezoidal + k], old[n + k], old[n + stiff + k], old[n + 2 * stiff + k]];
      known[2 * (at.past + trapezoidal + k)] = 0;
      known[2 * (at.past + trapezoidal + k) + 1] = 0;
      for (const part of [3.5 * x0, -2.25 * x1, (5 / 6) * x2, -0.125 * x3]) addNumber(known, at.past + trapezoidal + k, part);
    }
    set(at.newU, audioV);
    set(at.newU + 1, controlV);
    set(at.oldU, old[cell.slots + L.OLD_AUDIO]);
    set(at.oldU + 1, old[cell.slots + L.OLD_CONTROL]);
    this.portCurrents(cell.state).forEach((current, k) => {
      set(at.newJ + k, current);
    });
    this.portCurrents(old).forEach((current, k) => {
      set(at.oldJ + k, current);
    });
    set(at.one, 1);
  }

  private portResiduals(drawn: Drawn, currents: number, stateFloors: readonly number[]): Residual[] {
    const { cell, step } = this;
    const at = knownPlaces(cell.stateCount);
    const known = Float64Array.from(this.known);
    drawn.ports.forEach((current, k) => {
      known[2 * (at.newJ + k)] = current;
    });
    const z = (port: number, k: number) => step.ports[2 * (port * at.width + at.newJ + k)];
    const missed = [drawn.vgs, drawn.vgd].map((v, port) => {
      const sum = new Float64Array(2);
      const gross = combine(sum, step.ports, port * at.width, at.width, known, -1);
      addNumber(sum, 0, cell.numbers.polarity * v);
      const forward = (Math.abs(z(port, 0)) + Math.abs(z(port, 1))) * drawn.gross;
      const carried = stateFloors.reduce((total, floor, k) => total + floor * step.portSpread[port * stateFloors.length + k], 0);
      return { v: sum[0], floor: carried + ROUNDING * (gross + Math.abs(v) + Math.abs(drawn.gateOffV) + forward) };
    });
    const determinant = this.determinant();
    const admittance = [
      [z(1, 1) / determinant, -z(0, 1) / determinant],
      [-z(1, 0) / determinant, z(0, 0) / determinant],
    ];
    return admittance.map(([first, second], port) => ({
      where: port === 0 ? 'gate-source' : 'gate-drain',
      value: first * missed[0].v + second * missed[1].v,
      currents,
      floor: Math.abs(first) * missed[0].floor + Math.abs(second) * missed[1].floor + this.floor() + drawn.channelFloor,
    }));
  }

  /** The largest current at the FET's nodes: its own, or that of a resistor there. */
  private currentsAtNodes(own: number): number {
    const args = this.inputs();
    return this.network.currents.reduce((most, row) => {
      let sum = 0;
      for (let c = 0; c < row.length; c++) sum += row[c] * args[2 * c];
      return Math.max(most, Math.abs(sum));
    }, own);
  }

  /** Of the ports' impedances, from 32 digits because the two may be nearly one. */
  private determinant(): number {
    const { ports } = this.step;
    const { width, newJ } = knownPlaces(this.cell.stateCount);
    const sum = new Float64Array(2);
    addProduct(sum, 0, 1, ports, newJ, ports, width + newJ + 1);
    addProduct(sum, 0, -1, ports, newJ + 1, ports, width + newJ);
    return sum[0];
  }

  private stateResiduals(currents: number, gross: number): Residual[] {
    const { cell, step, known } = this;
    const n = cell.stateCount;
    const at = knownPlaces(n);
    const { width } = at;
    const now = new Float64Array(2 * n);
    for (let k = 0; k < n; k++) now[2 * k] = cell.state[k];
    const base = this.floor();
    const sizes = Float64Array.from(known, (value, i) => (i >= 2 * at.newJ && i < 2 * at.one && i % 2 === 0 ? gross : value));
    const grossKnown = Array.from({ length: n }, (_, k) => combine(new Float64Array(2), step.right, k * width, width, sizes));
    return Array.from({ length: n }, (_, k) => {
      const sum = new Float64Array(2);
      combine(sum, step.left, k * n, n, now);
      combine(sum, step.right, k * width, width, known, -1);
      const rounded = grossKnown.reduce((total, v, c) => total + step.spread[k * n + c] * v, 0);
      const flow = new Float64Array(2);
      combine(flow, this.network.rows, k * this.network.width, this.network.width, this.inputs());
      const isCurrent = cell.numbers.plan.elements[cell.numbers.plan.states[k].element].kind === 'capacitor';
      return {
        where: isCurrent ? 'capacitor' : 'inductor',
        value: sum[0],
        currents: Math.max(currents, Math.abs(flow[0])),
        floor: base + ROUNDING * rounded,
      };
    });
  }

  private outputResidual(outputV: number): Residual {
    const { cell, network } = this;
    const sum = new Float64Array(2);
    const gross = combine(sum, network.rows, (cell.stateCount + 2) * network.width, network.width, this.inputs());
    return {
      where: 'output',
      value: outputV - sum[0],
      currents: this.largestVoltage(),
      floor: ROUNDING * gross + (OUTPUT_SHARE + ROUNDING * network.outputSpread) * this.largestVoltage(),
    };
  }

  private floor(): number {
    return ROUNDING * this.largestConductance() * this.largestVoltage();
  }

  /** Of resistors, capacitors over a step, and the control's draw, S. */
  private largestConductance(): number {
    const { elements } = this.cell.numbers.plan;
    return elements.reduce((most, element, i) => {
      const value = Math.abs(this.cell.values[i]);
      if (element.kind === 'conductance' || element.kind === 'transconductance') return Math.max(most, value);
      return element.kind === 'capacitor' ? Math.max(most, value / this.cell.stepSec) : most;
    }, 0);
  }

  /** Of states before and after the sample, of sources and supplies, V. */
  private largestVoltage(): number {
    const { cell, known } = this;
    const { states, elements } = cell.numbers.plan;
    let most = 0;
    for (let k = 0; k < knownPlaces(cell.stateCount).newJ; k++) {
      const isCurrent = k < cell.stateCount && elements[states[k].element].kind === 'inductor';
      const size = k < cell.stateCount ? Math.max(Math.abs(known[2 * k]), Math.abs(cell.state[k])) : Math.abs(known[2 * k]);
      most = Math.max(most, size * (isCurrent ? cell.values[states[k].element] / cell.stepSec : 1));
    }
    return elements.reduce((v, element, i) => (element.kind === 'supply' ? Math.max(v, Math.abs(cell.values[i])) : v), most);
  }

  /** The network's columns after the step. */
  private inputs(): Float64Array {
    const { known, cell } = this;
    const n = cell.stateCount;
    const at = knownPlaces(n);
    const args = new Float64Array(2 * (n + DRIVES));
    for (let k = 0; k < n; k++) args[2 * k] = cell.state[k];
    args[2 * (n + AUDIO)] = known[2 * at.newU];
    args[2 * (n + CONTROL)] = known[2 * at.newU + 2];
    args[2 * (n + CONSTANT)] = 1;
    args[2 * (n + GATE_SOURCE)] = known[2 * at.newJ];
    args[2 * (n + GATE_DRAIN)] = known[2 * at.newJ + 2];
    return args;
  }
}

/** Adds a row of coefficients, times its arguments, to a pair; returns the sum of the terms' sizes. */
function combine(to: Float64Array, rows: Float64Array, from: number, width: number, args: Float64Array, sign = 1): number {
  let gross = 0;
  for (let c = 0; c < width; c++) {
    addProduct(to, 0, sign, rows, from + c, args, c);
    gross += Math.abs(rows[2 * (from + c)] * args[2 * c]);
  }
  return gross;
}
