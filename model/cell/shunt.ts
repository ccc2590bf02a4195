/**
 * The shunt cell as a list of elements: source and series resistor to the drain, load at the drain, source pin at 0 V, the control through
 * its resistor to the gate, and one of three feedbacks from drain to gate. Parts of value zero are left out, so that they cost no state. The device is taken at its
 * working temperature.
 */
import type { Cell, Device } from '../design/types.ts';
import { type Circuit, type Element, GROUND } from './circuit.ts';

/** The circuit of a cell with its device. Values are taken as valid (the document's reader has checked them). */
export function shuntCircuit(cell: Cell, device: Device): Circuit {
  const elements: Element[] = [
    { kind: 'source', name: 'audio', node: 'input', drive: 'audio' },
    { kind: 'source', name: 'control', node: 'control', drive: 'control' },
    resistor('series', 'input', 'drain', cell.sourceOhm + cell.seriesOhm),
    resistor('load', 'drain', GROUND, cell.loadOhm),
    ...feedbackElements(cell),
    ...capacitor('loadF', 'drain', GROUND, cell.loadF, 'parasitic'),
    ...capacitor('gateSourceF', 'gate', GROUND, device.gateSourceF, 'parasitic'),
    ...capacitor('gateDrainF', 'gate', 'drain', device.gateDrainF, 'parasitic'),
  ];
  const { leakageS } = device.junction;
  if (leakageS > 0) {
    elements.push({ kind: 'conductance', name: 'gateSourceLeak', a: 'gate', b: GROUND, valueS: leakageS });
    elements.push({ kind: 'conductance', name: 'gateDrainLeak', a: 'gate', b: 'drain', valueS: leakageS });
  }
  return { elements, jfet: { drain: 'drain', gate: 'gate', source: GROUND, clamp: null }, outputNode: 'drain' };
}

function feedbackElements(cell: Cell): Element[] {
  const { feedback, controlOhm } = cell;
  if (feedback.kind === 'none') return [resistor('control', 'control', 'gate', controlOhm)];
  if (feedback.kind === 'buffered') {
    return [
      { kind: 'summer', name: 'feedback', output: 'sum', direct: 'control', plus: 'drain', minus: GROUND, fraction: feedback.fraction },
      resistor('control', 'sum', 'gate', controlOhm),
    ];
  }
  const pair = resistor('control', 'control', 'gate', controlOhm);
  const blocking = feedback.blockingF ?? 0;
  if (blocking === 0) return [pair, resistor('feedback', 'drain', 'gate', feedback.drainOhm)];
  return [
    pair,
    ...capacitor('blocking', 'drain', 'blocked', blocking, 'coupling'),
    resistor('feedback', 'blocked', 'gate', feedback.drainOhm),
  ];
}

function resistor(name: string, a: string, b: string, ohm: number): Element {
  return { kind: 'conductance', name, a, b, valueS: 1 / ohm };
}

function capacitor(name: string, a: string, b: string, valueF: number, role: 'coupling' | 'parasitic'): Element[] {
  return valueF > 0 ? [{ kind: 'capacitor', name, a, b, valueF, role }] : [];
}
