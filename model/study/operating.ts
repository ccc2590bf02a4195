/**
 * Where a cell stands at rest: every node's voltage, the device's currents and slopes, and the device's own values at the working temperature.
 *
 * Law      device/law.ts and its exact derivatives; each gate junction IS·(exp(v/nVT) − 1), with its leakage beside it
 * Scheme   the device's two port voltages as the cell settles (`settle`), then one nodal solution of the circuit with its currents
 * Error    `errorV`: the larger difference between those port voltages and the nodal solution's
 */
import { type CellNumbers, createCell, gateConducts, gateSourceV, overdriveV, settle } from '../cell/cell.ts';
import type { Circuit } from '../cell/circuit.ts';
import { cellNumbers, circuitOf, deviceOf, variantAt } from '../cell/fromDesign.ts';
import { restControlV } from '../control/range.ts';
import type { Design, Device } from '../design/types.ts';
import { channelCurrentA, channelRegion, channelSlope, channelTerm, type LawConstants, lawConstants } from '../device/law.ts';
import { exp } from '../device/math.ts';
import { atTemperature, ZERO_CELSIUS_K } from '../device/temperature.ts';
import { deviation } from '../cell/kernels/graded.ts';
import { createNetwork, type Network, NO_SLOPES, type Slopes, steadyVoltages } from './network.ts';
import { requireRange } from './require.ts';

/** Boltzmann's constant, J/K, and the elementary charge, C (SI 2019, exact). */
export const BOLTZMANN = 1.380649e-23;
export const CHARGE_C = 1.602176634e-19;
/** Forward current above which a gate junction is said to conduct, A. */
const CONDUCTS_A = 1e-9;
const SECANT_STEPS = 30;

export interface OperatingOptions {
  /** Voltage of the control's driver, V; when left out, where the control rests: an LFO midway between its ends. */
  readonly controlV?: number;
  /** Instead of `controlV`: the gate-source voltage at rest, V, to which the driver is set. */
  readonly gateV?: number;
  /** 0 left, 1 right, where the devices differ. */
  readonly channel?: number;
}

/** Voltages and currents carry the sign of the part's channel; currents flow into the terminal that they are named after. */
export interface OperatingPoint {
  readonly controlV: number;
  /** Of every node of the circuit by its name (`cell/shunt.ts`), re 0 V. */
  readonly nodeV: Readonly<Record<string, number>>;
  readonly vgsV: number;
  readonly vdsV: number;
  /** The channel's current from drain to source. */
  readonly drainA: number;
  readonly region: 'ohmic' | 'saturated' | 'cutoff';
  readonly gateConducts: boolean;
  /** Slope resistance of the channel here, dVDS/dID at this VGS, Ω; Infinity when cut off. */
  readonly rdsOhm: number;
  /** dID/dVGS at this VDS, S. */
  readonly gfsS: number;
  /** Gate current to each end, leakage and gate clamp included. */
  readonly gateSourceA: number;
  readonly gateDrainA: number;
  /** Slope of each junction, leakage and gate clamp included, S. */
  readonly gateSourceS: number;
  readonly gateDrainS: number;
  /** The device's own values at the working temperature: IDSS, VGS(off), and the slope resistance at VGS = VDS = 0. */
  readonly idssA: number;
  readonly gateOffV: number;
  readonly r0Ohm: number;
  readonly errorV: number;
}

/** A cell at rest with its linear picture, for the readings that stand on it. */
export interface Linearised {
  readonly point: OperatingPoint;
  readonly network: Network;
  /** White current of both junctions and the clamp that shot noise goes by, A: forward plus reverse currents, leakage included. */
  readonly shot: { readonly gateSourceA: number; readonly gateDrainA: number };
}

/** The rest of one variant and channel. Throws a RangeError naming an option or a value that cannot be used. */
export function operatingPoint(design: Design, variantIndex: number, options: OperatingOptions = {}): OperatingPoint {
  return linearise(design, variantIndex, options).point;
}

/** The rest, and the circuit with its FET replaced by its slopes there. */
export function linearise(design: Design, variantIndex: number, options: OperatingOptions = {}): Linearised {
  const channel = options.channel ?? 0;
  const numbers = cellNumbers(design, variantIndex, channel);
  const device = deviceOf(variantAt(design, variantIndex), channel);
  const circuit = circuitOf(design, variantIndex, channel);
  const controlV = restingControlV(design, variantIndex, numbers, options);
  const cell = createCell(numbers, 1e-3);
  settle(cell, 0, controlV);
  const law = lawConstants(device, design.tempC);
  const sign = numbers.polarity;
  const ends = endsAt(device, design.tempC, circuit, law, overdriveV(cell, 'source'), overdriveV(cell, 'drain'));
  const { drain, gate, source } = circuit.jfet;
  const nodeV = steadyVoltages(createNetwork(circuit, NO_SLOPES), { audio: 0, control: controlV }, [
    { from: drain, to: source, valueA: sign * ends.channelA },
    { from: gate, to: source, valueA: sign * ends.sourceJunction.currentA },
    { from: gate, to: drain, valueA: sign * ends.drainJunction.currentA },
  ]);
  const vgsV = sign * ends.vgs;
  const vgdV = sign * ends.vgd;
  const { leakageS } = atTemperature(device, design.tempC).device.junction;
  const point: OperatingPoint = {
    controlV,
    nodeV,
    vgsV,
    vdsV: vgsV - vgdV,
    drainA: sign * ends.channelA,
    region: channelRegion(overdriveV(cell, 'source'), overdriveV(cell, 'drain')),
    gateConducts: gateConducts(cell, CONDUCTS_A),
    rdsOhm: 1 / ends.slopes.drainS,
    gfsS: ends.slopes.sourceS - ends.slopes.drainS,
    gateSourceA: sign * (ends.sourceJunction.currentA + leakageS * ends.vgs),
    gateDrainA: sign * (ends.drainJunction.currentA + leakageS * ends.vgd),
    gateSourceS: ends.sourceJunction.slopeS + leakageS,
    gateDrainS: ends.drainJunction.slopeS + leakageS,
    idssA: channelTerm(law, -law.gateOffV) - channelTerm(law, Number.NEGATIVE_INFINITY),
    gateOffV: sign * law.gateOffV,
    r0Ohm: 1 / channelSlope(law, -law.gateOffV),
    errorV: Math.max(Math.abs(nodeV[gate] - nodeV[source] - vgsV), Math.abs(nodeV[gate] - nodeV[drain] - vgdV)),
  };
  const shot = {
    gateSourceA: ends.sourceJunction.shotA + leakageS * Math.abs(ends.vgs),
    gateDrainA: ends.drainJunction.shotA + leakageS * Math.abs(ends.vgd),
  };
  return { point, network: createNetwork(atBias(circuit, device, ends.vgs, ends.vgd), ends.slopes), shot };
}

/** The circuit with the gate's capacitances at their values for these voltages, n-channel frame. */
function atBias(circuit: Circuit, { grading, barrierV }: Device, vgs: number, vgd: number): Circuit {
  if (grading === 0) return circuit;
  const above = new Float64Array(2);
  const elements = circuit.elements.map((element) => {
    const isSource = element.name === 'gateSourceF';
    if (element.kind !== 'capacitor' || !(isSource || element.name === 'gateDrainF')) return element;
    deviation(grading, barrierV, isSource ? vgs : vgd, above, 0);
    return { ...element, valueF: element.valueF * (1 + above[1]) };
  });
  return { ...circuit, elements };
}

interface Junction {
  readonly currentA: number;
  readonly slopeS: number;
  /** Forward plus reverse current. */
  readonly shotA: number;
}

/** Currents and slopes at both ends, in the n-channel frame, from the two overdrives. */
function endsAt(device: Device, tempC: number, { jfet }: Circuit, law: LawConstants, vs: number, vd: number) {
  const thermalV = (BOLTZMANN * (tempC + ZERO_CELSIUS_K)) / CHARGE_C;
  const { reverseA, ideality } = atTemperature(device, tempC).device.junction;
  const { lambdaPerV: lambda } = device;
  const floor = channelTerm(law, Number.NEGATIVE_INFINITY);
  const Fs = channelTerm(law, vs) - floor;
  const Fd = channelTerm(law, vd) - floor;
  const past = 1 + lambda * Math.max(-vd, 0);
  const pastReversed = 1 + lambda * Math.max(-vs, 0);
  const vgs = vs + law.gateOffV;
  const vgd = vd + law.gateOffV;
  const own = junctionAt(reverseA, ideality * thermalV, vgs);
  const clamp = junctionAt(jfet.clamp?.reverseA ?? 0, (jfet.clamp?.ideality ?? 1) * thermalV, vgs);
  const drainJunction = junctionAt(reverseA, ideality * thermalV, vgd);
  const sourceJunction = {
    currentA: own.currentA + clamp.currentA,
    slopeS: own.slopeS + clamp.slopeS,
    shotA: own.shotA + clamp.shotA,
  };
  const slopes: Slopes = {
    sourceS: channelSlope(law, vs) * past + (vs < 0 ? lambda * Fd : 0),
    drainS: channelSlope(law, vd) * pastReversed + (vd < 0 ? lambda * Fs : 0),
    gateSourceS: sourceJunction.slopeS,
    gateDrainS: drainJunction.slopeS,
  };
  return { channelA: channelCurrentA(law, lambda, vs, vd), vgs, vgd, sourceJunction, drainJunction, slopes };
}

function junctionAt(reverseA: number, nVt: number, v: number): Junction {
  if (reverseA === 0) return { currentA: 0, slopeS: 0, shotA: 0 };
  const forwardA = reverseA * exp(v / nVt);
  return { currentA: forwardA - reverseA, slopeS: forwardA / nVt, shotA: forwardA + reverseA };
}

/** The driver's voltage that the options ask for. Throws a RangeError where it lies beyond ±1 kV or cannot bring the gate to `gateV`. */
export function restingControlV(design: Design, variantIndex: number, numbers: CellNumbers, options: OperatingOptions): number {
  const { gateV } = options;
  const controlV =
    gateV === undefined ? (options.controlV ?? restControlV(variantAt(design, variantIndex).control)) : controlForGate(numbers, gateV);
  requireRange('controlV', controlV, -1e3, 1e3, 'V');
  return controlV;
}

/** The driver's voltage that brings the gate at rest to `gateV`, by the secant method: one step where the gate draws no current. */
function controlForGate(numbers: CellNumbers, gateV: number): number {
  requireRange('gateV', gateV, -1e3, 1e3, 'V');
  const cell = createCell(numbers, 1e-3);
  const missAt = (controlV: number) => {
    settle(cell, 0, controlV);
    return gateSourceV(cell) - gateV;
  };
  let before = 0;
  let missBefore = missAt(before);
  let now = gateV;
  for (let step = 0; step < SECANT_STEPS; step++) {
    const miss = missAt(now);
    if (Math.abs(miss) < 1e-9) return now;
    const next = now - (miss * (now - before)) / (miss - missBefore);
    before = now;
    missBefore = miss;
    now = next;
  }
  throw new RangeError(`gateV is ${gateV}; expected a voltage that the driver can bring the gate to`);
}
