/**
 * The shunt cell and the board around it as a list of elements. Parts that are absent, or of value zero, are left out and cost no state.
 *
 * signal ─ feed ─ pad ─ buffer ─ coupling ─ series ─┬─ drain ─ output coupling ─ load
 *                                                    FET, its source pin at 0 V, on a shared ground path or at a divided supply
 * control ─ driver ─ smoothing ─ (sum) ─ controlOhm ─ gate, with one of three feedbacks from the drain
 */
import type { Cell, Device } from '../design/types.ts';
import { type Circuit, type Element, GROUND } from './circuit.ts';

/** The circuit of a cell with its device at its working temperature. Values are taken as valid: the document's reader has checked them. */
export function shuntCircuit(cell: Cell, device: Device): Circuit {
  const source = referenceElements(cell);
  const input = inputElements(cell);
  const driver = driverElements(cell);
  const elements: Element[] = [
    { kind: 'source', name: 'audio', node: 'signal', drive: 'audio' },
    { kind: 'source', name: 'control', node: 'control', drive: 'control' },
    ...input.elements,
    resistor('series', input.node, 'drain', input.ohm + cell.seriesOhm),
    ...(cell.drainReturnOhm === null ? [] : [resistor('return', 'drain', source.node, cell.drainReturnOhm)]),
    ...source.elements,
    ...driver.elements,
    ...feedbackElements(cell, driver.node, source.node),
    ...loadElements(cell),
    ...gateElements(device, source.node),
    ...capacitor('stray', driver.node, 'drain', cell.strayF, 'parasitic'),
  ];
  const clamp = cell.clamp.kind === 'diode' ? cell.clamp : null;
  const outputNode = cell.outputCouplingF === null ? 'drain' : 'output';
  return { elements, jfet: { drain: 'drain', gate: 'gate', source: source.node, clamp }, outputNode };
}

interface Stretch {
  readonly elements: Element[];
  readonly node: string;
}

/** From the signal to the series resistor; `ohm` is resistance that is simply in series with that. */
function inputElements(cell: Cell): Stretch & { readonly ohm: number } {
  const elements: Element[] = [];
  let { node, ohm } = feedElements(cell, elements);
  if (cell.pad.kind === 'divider') {
    elements.push(resistor('padUpper', node, 'pad', ohm + cell.pad.upperOhm), resistor('padLower', 'pad', GROUND, cell.pad.lowerOhm));
    node = 'pad';
    ohm = 0;
  }
  if (cell.buffer.kind === 'follower') {
    const { offsetV, biasA } = cell.buffer;
    if (ohm > 0) elements.push(resistor('source', node, 'follower', ohm));
    const sensed = ohm > 0 ? 'follower' : node;
    elements.push(
      { kind: 'draw', name: 'bias', node: sensed, valueA: biasA },
      { kind: 'supply', name: 'offset', node: 'offset', valueV: offsetV },
      { kind: 'summer', name: 'buffer', output: 'buffered', direct: sensed, plus: 'offset', minus: GROUND, fraction: 1 },
    );
    node = 'buffered';
    ohm = 0;
  }
  if (cell.coupling.kind === 'capacitor') {
    const { couplingF, leakOhm } = cell.coupling;
    if (ohm > 0) elements.push(resistor('source', node, 'coupling', ohm));
    const from = ohm > 0 ? 'coupling' : node;
    elements.push(...capacitor('coupling', from, 'coupled', couplingF, 'coupling'), resistor('couplingLeak', from, 'coupled', leakOhm));
    node = 'coupled';
    ohm = 0;
  }
  return { elements, node, ohm };
}

function feedElements({ feed, sourceOhm }: Cell, elements: Element[]): { node: string; ohm: number } {
  if (feed.kind === 'direct') return { node: 'signal', ohm: sourceOhm };
  if (feed.kind === 'pickup') {
    const inside = sourceOhm > 0 ? 'winding' : 'pickup';
    elements.push({ kind: 'inductor', name: 'winding', a: 'signal', b: inside, valueH: feed.inductanceH });
    if (sourceOhm > 0) elements.push(resistor('source', inside, 'pickup', sourceOhm));
    elements.push(
      ...capacitor('cable', 'pickup', GROUND, feed.windingF + feed.cableF, 'coupling'),
      resistor('volume', 'pickup', GROUND, feed.volumeOhm),
    );
    return { node: 'pickup', ohm: 0 };
  }
  const inside = sourceOhm > 0 ? 'stage' : 'signal';
  if (sourceOhm > 0) elements.push(resistor('source', 'signal', inside, sourceOhm));
  elements.push(...capacitor('stage', inside, 'staged', feed.couplingF, 'coupling'), resistor('bleed', 'staged', GROUND, feed.bleedOhm));
  return { node: 'staged', ohm: 0 };
}

/** What the source pin stands on. */
function referenceElements({ reference, sharedGround }: Cell): Stretch {
  const elements: Element[] = [];
  let node = GROUND;
  if (sharedGround.kind === 'shared') {
    node = 'earth';
    elements.push(resistor('earth', 'earth', GROUND, sharedGround.groundOhm), {
      kind: 'transconductance',
      name: 'controlDraw',
      node: 'earth',
      sensed: 'control',
      valueS: sharedGround.drawAPerV,
    });
  }
  if (reference.kind === 'halfSupply') {
    elements.push(
      { kind: 'supply', name: 'supply', node: 'supply', valueV: reference.supplyV },
      resistor('upper', 'supply', 'half', reference.upperOhm),
      resistor('lower', 'half', node, reference.lowerOhm),
      ...capacitor('decoupling', 'half', node, reference.decouplingF, 'coupling'),
    );
    node = 'half';
  }
  return { elements, node };
}

function driverElements({ driverOhm, smoothing }: Cell): Stretch {
  if (smoothing.kind === 'rc') {
    return {
      elements: [
        resistor('smoothing', 'control', 'smoothed', driverOhm + smoothing.smoothingOhm),
        ...capacitor('smoothing', 'smoothed', GROUND, smoothing.smoothingF, 'coupling'),
      ],
      node: 'smoothed',
    };
  }
  return driverOhm > 0
    ? { elements: [resistor('driver', 'control', 'driver', driverOhm)], node: 'driver' }
    : { elements: [], node: 'control' };
}

function feedbackElements({ feedback, controlOhm }: Cell, driver: string, source: string): Element[] {
  if (feedback.kind === 'none') return [resistor('control', driver, 'gate', controlOhm)];
  if (feedback.kind === 'buffered') {
    return [
      { kind: 'summer', name: 'feedback', output: 'sum', direct: driver, plus: 'drain', minus: source, fraction: feedback.fraction },
      resistor('control', 'sum', 'gate', controlOhm),
    ];
  }
  const pair = resistor('control', driver, 'gate', controlOhm);
  const { blockingF, drainOhm } = feedback;
  if (blockingF === null) return [pair, resistor('feedback', 'drain', 'gate', drainOhm)];
  return [pair, ...capacitor('blocking', 'drain', 'blocked', blockingF, 'coupling'), resistor('feedback', 'blocked', 'gate', drainOhm)];
}

function loadElements({ outputCouplingF, loadOhm, loadF }: Cell): Element[] {
  const node = outputCouplingF === null ? 'drain' : 'output';
  return [
    ...(outputCouplingF === null ? [] : capacitor('output', 'drain', 'output', outputCouplingF, 'coupling')),
    resistor('load', node, GROUND, loadOhm),
    ...capacitor('load', node, GROUND, loadF, 'parasitic'),
  ];
}

function gateElements({ gateSourceF, gateDrainF, junction }: Device, source: string): Element[] {
  const { leakageS } = junction;
  return [
    ...capacitor('gateSourceF', 'gate', source, gateSourceF, 'parasitic'),
    ...capacitor('gateDrainF', 'gate', 'drain', gateDrainF, 'parasitic'),
    ...conductance('gateSourceLeak', 'gate', source, leakageS),
    ...conductance('gateDrainLeak', 'gate', 'drain', leakageS),
  ];
}

function resistor(name: string, a: string, b: string, ohm: number): Element {
  return { kind: 'conductance', name, a, b, valueS: 1 / ohm };
}

function conductance(name: string, a: string, b: string, valueS: number): Element[] {
  return valueS > 0 ? [{ kind: 'conductance', name, a, b, valueS }] : [];
}

function capacitor(name: string, a: string, b: string, valueF: number, role: 'coupling' | 'parasitic'): Element[] {
  return valueF > 0 ? [{ kind: 'capacitor', name, a, b, valueF, role }] : [];
}
