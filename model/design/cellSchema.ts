/**
 * The document's part that describes the cell and the board around it. A part that a board may lack is a union whose default is its absence.
 * Usual values and ranges that parts have: common practice, no source, unless said.
 */
import { absentOr, choice, group, type Member, quantity, union } from './kinds.ts';
import type { Cell, Coupling, Feed, Feedback, GateClamp, InputBuffer, Pad, Reference, SharedGround, Smoothing } from './types.ts';

const feed = union('Feed', 'What the signal comes from.', {
  direct: group<Member<Feed, 'kind', 'direct'>>('DirectFeed', 'A voltage behind sourceOhm.', {}),
  pickup: group<Member<Feed, 'kind', 'pickup'>>('PickupFeed', 'A guitar pickup with its cable; sourceOhm is its winding resistance.', {
    inductanceH: quantity('H', 1e-3, 100, 4, 'Inductance; guitar pickups have 2 to 8 H (from memory).'),
    windingF: quantity('F', 1e-13, 1e-8, 100e-12, 'Capacitance of the winding; 50 to 200 pF (from memory).'),
    cableF: quantity('F', 1e-13, 1e-7, 500e-12, 'Capacitance of the cable; 100 pF to 1 nF (from memory).'),
    volumeOhm: quantity('Ω', 1e3, 1e8, 500e3, 'Volume control across pickup and cable, turned up; 250 kΩ to 1 MΩ (from memory).'),
  }),
  stage: group<Member<Feed, 'kind', 'stage'>>('StageFeed', 'A previous stage; sourceOhm is its output resistance.', {
    couplingF: quantity('F', 1e-9, 1e-3, 1e-6, 'Output capacitor of the stage.'),
    bleedOhm: quantity('Ω', 1e3, 1e9, 1e6, 'Resistor from after that capacitor to 0 V.'),
  }),
});

const pad = union('Pad', 'Two resistors that attenuate the source.', {
  none: group<Member<Pad, 'kind', 'none'>>('NoPad', 'The source goes on as it is.', {}),
  divider: group<Member<Pad, 'kind', 'divider'>>('DividerPad', 'A voltage divider.', {
    upperOhm: quantity('Ω', 1, 1e8, 10e3, 'Resistor from the source to the tap.'),
    lowerOhm: quantity('Ω', 1, 1e8, 1e3, 'Resistor from the tap to 0 V.'),
  }),
});

const buffer = union('InputBuffer', 'A voltage follower before the cell.', {
  none: group<Member<InputBuffer, 'kind', 'none'>>('NoInputBuffer', 'The source drives the cell itself.', {}),
  follower: group<Member<InputBuffer, 'kind', 'follower'>>('FollowerInputBuffer', 'A follower with offset and bias current.', {
    offsetV: quantity('V', -1, 1, 0, 'Offset voltage, added to its output.'),
    biasA: quantity('A', -1e-3, 1e-3, 0, 'Bias current that flows into its input.'),
  }),
});

const coupling = union('Coupling', 'Capacitor before the series resistor.', {
  none: group<Member<Coupling, 'kind', 'none'>>('NoCoupling', 'A wire.', {}),
  capacitor: group<Member<Coupling, 'kind', 'capacitor'>>('CapacitorCoupling', 'A capacitor with leakage.', {
    couplingF: quantity('F', 1e-10, 1e-2, 1e-6, 'Coupling capacitor.'),
    leakOhm: quantity('Ω', 1e4, 1e14, 1e12, 'Leakage resistance across it; 100 kΩ to 10 MΩ for electrolytic ones, far more for film.'),
  }),
});

const smoothing = union('Smoothing', "Resistor and capacitor in the control's path, before the pair.", {
  none: group<Member<Smoothing, 'kind', 'none'>>('NoSmoothing', 'The driver goes to the pair itself.', {}),
  rc: group<Member<Smoothing, 'kind', 'rc'>>('RcSmoothing', 'A resistor, then a capacitor to 0 V.', {
    smoothingOhm: quantity('Ω', 1, 1e8, 10e3, "Resistor from the control's driver; outside the pair, so it divides the control with it."),
    smoothingF: quantity('F', 1e-12, 1e-3, 100e-9, 'Capacitor from after it to 0 V.'),
  }),
});

const feedback = union('Feedback', 'How part of the drain voltage reaches the gate.', {
  none: group<Member<Feedback, 'kind', 'none'>>('NoFeedback', 'The gate follows the control alone.', {}),
  resistor: group<Member<Feedback, 'kind', 'resistor'>>(
    'ResistorFeedback',
    'A resistor from drain to gate, with controlOhm as its partner.',
    {
      drainOhm: quantity('Ω', 1, 1e9, 1e6, 'Resistor from drain to gate.'),
      blockingF: absentOr('F', 1e-12, 1e-3, 'Capacitor in series with drainOhm; null is a wire in its place.'),
    },
  ),
  buffered: group<Member<Feedback, 'kind', 'buffered'>>(
    'BufferedFeedback',
    'A buffered fraction of the drain, added to the control at full size.',
    { fraction: quantity('', 0, 1, 0.5, 'Fraction of the drain voltage that is added at the gate.') },
  ),
});

const clamp = union('GateClamp', 'A diode from gate to source pin.', {
  none: group<Member<GateClamp, 'kind', 'none'>>('NoGateClamp', "Only the gate's own junctions clamp it.", {}),
  diode: group<Member<GateClamp, 'kind', 'diode'>>(
    'DiodeGateClamp',
    'A diode that conducts before the gate does; the other way round for a p-channel part.',
    {
      reverseA: quantity('A', 1e-15, 1e-5, 1e-8, 'Saturation current; 10 nA is a small Schottky diode, 0.3 V at 1 mA.'),
      ideality: quantity('', 1, 3, 1.05, 'Ideality factor (emission coefficient).'),
    },
  ),
});

const reference = union('Reference', 'What the source pin stands on.', {
  ground: group<Member<Reference, 'kind', 'ground'>>('GroundReference', '0 V.', {}),
  halfSupply: group<Member<Reference, 'kind', 'halfSupply'>>('HalfSupplyReference', 'A divided supply.', {
    supplyV: quantity('V', -60, 60, 9, 'Supply voltage.'),
    upperOhm: quantity('Ω', 1, 1e8, 10e3, 'Resistor from the supply to the source pin.'),
    lowerOhm: quantity('Ω', 1, 1e8, 10e3, 'Resistor from the source pin to 0 V.'),
    decouplingF: quantity('F', 1e-9, 1, 47e-6, 'Capacitor across lowerOhm.'),
  }),
});

const sharedGround = union('SharedGround', "A ground path that also carries the control circuit's current.", {
  none: group<Member<SharedGround, 'kind', 'none'>>('NoSharedGround', 'Cell and control have grounds of their own.', {}),
  shared: group<Member<SharedGround, 'kind', 'shared'>>('SharedGroundPath', 'A resistance between the source pin and 0 V.', {
    groundOhm: quantity('Ω', 1e-4, 100, 0.1, 'Resistance of the path.'),
    drawAPerV: quantity('S', -1, 1, 1e-3, "Current of the control's circuit in it, for each volt of control."),
  }),
});

export const cell = group<Cell>('Cell', 'The shunt cell and the board around it.', {
  circuit: choice(['shunt'], 'shunt', 'The circuit.'),
  feed,
  sourceOhm: quantity('Ω', 0, 1e7, 0, 'Resistance of the signal source.'),
  pad,
  buffer,
  coupling,
  seriesOhm: quantity('Ω', 1, 1e8, 10e3, 'Resistor from source to drain.'),
  drainReturnOhm: absentOr('Ω', 1, 1e9, "Resistor from the drain to the source pin, for the drain's direct current; null leaves it out."),
  outputCouplingF: absentOr('F', 1e-10, 1e-2, 'Capacitor from the drain to the load; null is a wire in its place.'),
  loadOhm: quantity('Ω', 1, 1e12, 1e6, 'Resistance to 0 V of what follows.'),
  loadF: quantity('F', 0, 1e-3, 100e-12, 'Capacitance to 0 V of what follows.'),
  driverOhm: quantity('Ω', 0, 1e7, 0, "Resistance of the control's driver, outside the pair; it limits how well an equal pair cancels."),
  smoothing,
  controlOhm: quantity('Ω', 1, 1e9, 1e6, 'Resistor from the control to the gate.'),
  feedback,
  clamp,
  reference,
  sharedGround,
  strayF: quantity('F', 0, 1e-9, 0, "Capacitance from the control's driver to the drain."),
});
