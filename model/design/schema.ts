/**
 * The document, described once: checking, defaults, editing and JSON Schema all follow from this table.
 * Limits are those of parts that exist or of what the model can solve, whichever is narrower.
 */
import { toJsonSchema } from './json-schema.ts';
import { absentOr, choice, flag, group, type Group, quantity, type Rule, text, type Union } from './kinds.ts';
import type {
  Cell,
  Control,
  Coupling,
  Design,
  Device,
  Feed,
  Feedback,
  GateClamp,
  InputBuffer,
  Junction,
  Noise,
  Output,
  Pad,
  Reference,
  SharedGround,
  Smoothing,
  Variant,
} from './types.ts';
import { plainly } from './wording.ts';

export const VERSION = 1;

type Member<U, K extends keyof U, V extends U[K]> = Omit<Extract<U, { [P in K]: V }>, K>;

/** The sign of VGS(off) belongs to the channel: no part has it otherwise. */
const signFollowsChannel: Rule = {
  fault({ channel, gateOffV }) {
    if (typeof gateOffV !== 'number') return null;
    if (channel === 'n' && gateOffV > -0.1) return { path: 'gateOffV', value: gateOffV, expected: '−20 V to −0.1 V for an n-channel part' };
    if (channel === 'p' && gateOffV < 0.1) return { path: 'gateOffV', value: gateOffV, expected: '0.1 V to 20 V for a p-channel part' };
    return null;
  },
  jsonSchema: {
    if: { properties: { channel: { const: 'p' } }, required: ['channel'] },
    // biome-ignore lint/suspicious/noThenProperty: the word is JSON Schema's own.
    then: { properties: { gateOffV: { minimum: 0.1 } }, required: ['gateOffV'] },
    else: { properties: { gateOffV: { maximum: -0.1 } } },
  },
};

/** The edges of a square or a ramp must fit into a period. */
const edgesFit: Rule = {
  fault({ shape, rateHz, edgeSec }) {
    if (shape === 'sine' || shape === 'triangle' || typeof rateHz !== 'number' || typeof edgeSec !== 'number' || edgeSec * rateHz <= 0.5)
      return null;
    return { path: 'edgeSec', value: edgeSec, expected: `at most half a period, ${plainly(0.5 / rateHz, 's', 3)}` };
  },
};

/** A follower moves from rest towards its limit, never away from it. */
const movesTowardsLimit: Rule = {
  fault({ restV, limitV, gainVPerV }) {
    if (typeof restV !== 'number' || typeof limitV !== 'number' || typeof gainVPerV !== 'number') return null;
    if (gainVPerV * (limitV - restV) >= 0) return null;
    const [side, sign] = limitV > restV ? ['above', '0 or more'] : ['below', '0 or less'];
    return { path: 'gainVPerV', value: gainVPerV, expected: `${sign}, since limitV (${limitV}) is ${side} restV (${restV})` };
  },
};

const namesDiffer: Rule = {
  fault({ variants }) {
    if (!Array.isArray(variants)) return null;
    const names = variants.map((variant: Partial<Variant> | undefined) => variant?.name);
    const second = names.findIndex((name, index) => name !== undefined && names.indexOf(name) < index);
    return second < 0 ? null : { path: `variants[${second}].name`, value: names[second], expected: 'a name that no other variant has' };
  },
};

const junction = group<Junction>('Junction', 'Each of the two gate junctions.', {
  reverseA: quantity('A', 0, 1e-6, 1e-14, 'Saturation current. 0: the junction never conducts.'),
  ideality: quantity('', 1, 3, 1, 'Ideality factor (emission coefficient).'),
  leakageS: quantity('S', 0, 1e-6, 1e-12, 'Leakage conductance across the junction.'),
});

const device: Group = group<Device>(
  'Device',
  'A junction FET by its data-sheet values.',
  {
    law: choice(
      ['square', 'gradual', 'smooth'],
      'square',
      'Law of the channel: square, gradual channel, or smooth with a sub-threshold tail.',
    ),
    channel: choice(['n', 'p'], 'n', 'Channel type.'),
    idssA: quantity('A', 1e-6, 1, 3e-3, 'IDSS, the drain current at VGS = 0 in saturation; positive for either channel.'),
    gateOffV: quantity(
      'V',
      -20,
      20,
      -1.5,
      'VGS(off). Negative for an n-channel part, positive for a p-channel one; at least 0.1 V in size.',
    ),
    lambdaPerV: quantity('1/V', 0, 1, 0, 'Channel-length modulation, acting on VDS beyond the knee only.'),
    barrierV: quantity('V', 0.3, 1.5, 0.8, 'Built-in potential of the gate junction.'),
    exponent: quantity('', 1.5, 3, 2, 'Exponent Q of the smooth law; real parts have 1.7 to 2.3 (from memory).'),
    tailV: quantity('V', 1e-3, 0.5, 0.03, "Width of the smooth law's sub-threshold tail."),
    readAtC: quantity('°C', -55, 150, 25, 'Temperature at which the values of this part were read.'),
    junction,
    gateSourceF: quantity('F', 0, 1e-9, 4e-12, 'Gate-source capacitance near VDS = 0.'),
    gateDrainF: quantity('F', 0, 1e-9, 4e-12, 'Gate-drain capacitance near VDS = 0, about the same as gate-source there.'),
    grading: quantity(
      '',
      0,
      0.6,
      0,
      "Exponent m of the capacitances' fall with reverse voltage: 0 constant, 1/3 graded, 1/2 abrupt junction.",
    ),
  },
  { rules: [signFollowsChannel] },
);

const feedback: Union = {
  kind: 'union',
  title: 'Feedback',
  description: 'How part of the drain voltage reaches the gate.',
  key: 'kind',
  default: 'none',
  members: {
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
      {
        fraction: quantity('', 0, 1, 0.5, 'Fraction of the drain voltage that is added at the gate.'),
      },
    ),
  },
};

/** A part or group of parts that is absent by default: a union whose first member is `none`. */
function optional(title: string, description: string, absent: string, members: Union['members'], none = 'none'): Union {
  return {
    kind: 'union',
    title,
    description,
    key: 'kind',
    default: none,
    members: { [none]: group(`No${title}`, absent, {}), ...members },
  };
}

const feed = optional(
  'Feed',
  'What the signal comes from.',
  'The source is a voltage behind sourceOhm.',
  {
    pickup: group<Member<Feed, 'kind', 'pickup'>>('PickupFeed', 'A guitar pickup with its cable; sourceOhm is its winding resistance.', {
      inductanceH: quantity('H', 1e-3, 100, 4, 'Inductance; guitar pickups have 2 to 8 H (from memory).'),
      windingF: quantity('F', 1e-13, 1e-8, 100e-12, 'Capacitance of the winding; 50 to 200 pF (from memory).'),
      cableF: quantity('F', 1e-13, 1e-7, 500e-12, 'Capacitance of the cable; 100 pF to 1 nF (from memory).'),
      volumeOhm: quantity('Ω', 1e3, 1e8, 500e3, 'Volume control across it, turned up; 250 kΩ to 1 MΩ (from memory).'),
    }),
    stage: group<Member<Feed, 'kind', 'stage'>>(
      'StageFeed',
      'A previous stage behind its output capacitor; sourceOhm is its output resistance.',
      {
        couplingF: quantity('F', 1e-9, 1e-3, 1e-6, 'Output capacitor of the stage.'),
        bleedOhm: quantity('Ω', 1e3, 1e9, 1e6, 'Resistor from after that capacitor to 0 V.'),
      },
    ),
  },
  'direct',
);

const pad = optional('Pad', 'Two resistors that attenuate the source.', 'No pad.', {
  divider: group<Member<Pad, 'kind', 'divider'>>('DividerPad', 'Two resistors.', {
    upperOhm: quantity('Ω', 1, 1e8, 10e3, 'From the source.'),
    lowerOhm: quantity('Ω', 1, 1e8, 1e3, 'To 0 V.'),
  }),
});

const buffer = optional('Buffer', 'A voltage follower before the cell.', 'No buffer.', {
  follower: group<Member<InputBuffer, 'kind', 'follower'>>('FollowerBuffer', 'A follower with offset and bias current.', {
    offsetV: quantity('V', -1, 1, 0, 'Offset voltage, added to its output.'),
    biasA: quantity('A', -1e-3, 1e-3, 0, 'Bias current into its input.'),
  }),
});

const coupling = optional('Coupling', 'Capacitor before the series resistor.', 'A wire.', {
  capacitor: group<Member<Coupling, 'kind', 'capacitor'>>('CapacitorCoupling', 'A capacitor with leakage.', {
    couplingF: quantity('F', 1e-10, 1e-2, 1e-6, 'Capacitance.'),
    leakOhm: quantity('Ω', 1e4, 1e15, 1e12, 'Leakage resistance across it.'),
  }),
});

const smoothing = optional('Smoothing', "Resistor and capacitor in the control's path.", 'No smoothing.', {
  rc: group<Member<Smoothing, 'kind', 'rc'>>('RcSmoothing', 'A resistor, then a capacitor to 0 V.', {
    smoothingOhm: quantity('Ω', 1, 1e8, 10e3, "From the control's driver."),
    smoothingF: quantity('F', 1e-12, 1e-3, 100e-9, 'To 0 V.'),
  }),
});

const clamp = optional('Clamp', 'A diode from gate to source pin.', 'No clamp.', {
  diode: group<Member<GateClamp, 'kind', 'diode'>>('DiodeClamp', 'A diode that conducts before the gate does.', {
    reverseA: quantity('A', 1e-15, 1e-5, 1e-8, 'Saturation current.'),
    ideality: quantity('', 1, 3, 1.05, 'Ideality factor.'),
  }),
});

const reference = optional(
  'Reference',
  'Where the source pin goes.',
  '0 V.',
  {
    halfSupply: group<Member<Reference, 'kind', 'halfSupply'>>('HalfSupplyReference', 'A divided supply.', {
      supplyV: quantity('V', -60, 60, 9, 'Supply voltage.'),
      upperOhm: quantity('Ω', 1, 1e8, 10e3, 'From the supply to the source pin.'),
      lowerOhm: quantity('Ω', 1, 1e8, 10e3, 'From there to 0 V.'),
      decouplingF: quantity('F', 1e-9, 1, 47e-6, 'Across the lower one.'),
    }),
  },
  'ground',
);

const sharedGround = optional('SharedGround', "A ground path that carries the control circuit's current.", 'The grounds are apart.', {
  shared: group<Member<SharedGround, 'kind', 'shared'>>('SharedGroundPath', 'A resistance under the source pin.', {
    groundOhm: quantity('Ω', 1e-4, 100, 0.1, 'Resistance of the path.'),
    drawAPerV: quantity('S', -1, 1, 1e-3, 'Current in it for each volt of control.'),
  }),
});

const cell = group<Cell>('Cell', 'The shunt cell and the board around it.', {
  circuit: choice(['shunt'], 'shunt', 'The circuit.'),
  feed,
  sourceOhm: quantity('Ω', 0, 1e7, 0, 'Resistance of the signal source.'),
  pad,
  buffer,
  coupling,
  seriesOhm: quantity('Ω', 1, 1e8, 10e3, 'Resistor from source to drain.'),
  drainReturnOhm: absentOr('Ω', 1, 1e9, 'Resistor from drain to source pin, for the direct current; null is none.'),
  outputCouplingF: absentOr('F', 1e-10, 1e-2, 'Capacitor from drain to load; null is a wire.'),
  loadOhm: quantity('Ω', 1, 1e12, 1e6, 'Resistance to 0 V of what follows.'),
  loadF: quantity('F', 0, 1e-3, 100e-12, 'Capacitance to 0 V of what follows.'),
  driverOhm: quantity('Ω', 0, 1e7, 0, "Resistance of the control's driver, outside the pair."),
  smoothing,
  controlOhm: quantity('Ω', 1, 1e9, 1e6, 'Resistor from the control to the gate.'),
  feedback,
  clamp,
  reference,
  sharedGround,
  strayF: quantity('F', 0, 1e-9, 0, "Capacitance from the control's driver to the drain."),
});

const volts = (usual: number, description: string) => quantity('V', -100, 100, usual, description);

const control: Union = {
  kind: 'union',
  title: 'Control',
  description: 'What moves the gate: the voltage at the driver, before controlOhm.',
  key: 'source',
  default: 'fixed',
  members: {
    fixed: group<Member<Control, 'source', 'fixed'>>('FixedControl', 'A steady voltage.', {
      controlV: volts(-1.2, 'The control voltage.'),
    }),
    lfo: group<Member<Control, 'source', 'lfo'>>(
      'LfoControl',
      'A low-frequency oscillator.',
      {
        shape: choice(
          ['sine', 'triangle', 'square', 'rising', 'falling'],
          'sine',
          'Shape of the swing; rising and falling ramps return within edgeSec.',
        ),
        rateHz: quantity('Hz', 0.01, 1000, 4, 'Cycles in a second.'),
        fromV: volts(-0.6, 'One end of the swing; it starts midway, moving away from here.'),
        toV: volts(-1.8, 'The other end of the swing.'),
        edgeSec: quantity(
          's',
          0,
          10,
          5e-3,
          'Duration of each edge of the square shape and of the flyback of a ramp; at most half a period.',
        ),
      },
      { rules: [edgesFit] },
    ),
    envelope: group<Member<Control, 'source', 'envelope'>>(
      'EnvelopeControl',
      'A follower of the signal: a rectifier, a threshold, attack and release.',
      {
        senses: choice(['input', 'output'], 'input', "Where the follower listens: the cell's input, or its output (a loop)."),
        rectifier: choice(['half', 'full'], 'full', 'Half-wave or full-wave rectifier.'),
        attackOhm: quantity('Ω', 1, 1e8, 4700, 'Resistor through which the timing capacitor is charged; with it, the attack time.'),
        releaseOhm: quantity('Ω', 100, 1e9, 220e3, 'Resistor across the timing capacitor; with it, the release time.'),
        timingF: quantity('F', 1e-12, 1e-2, 1e-6, 'Timing capacitor.'),
        thresholdV: quantity('V', 0, 100, 0.05, 'Voltage on the timing capacitor from which the control moves.'),
        gainVPerV: quantity(
          '',
          -1e4,
          1e4,
          6,
          'Change of control voltage for each volt above the threshold; its sign leads from restV to limitV.',
        ),
        restV: volts(-1.8, 'Control voltage while the signal is below the threshold.'),
        limitV: volts(-0.3, 'Control voltage that it does not pass.'),
        linked: flag(true, 'Both channels follow one control.'),
      },
      { rules: [movesTowardsLimit] },
    ),
    external: group<Member<Control, 'source', 'external'>>('ExternalControl', 'A recorded control signal.', {
      fullScaleV: volts(0.6, 'Change of control voltage for a sample of 1.0.'),
      offsetV: volts(-1.2, 'Control voltage for a sample of 0.'),
    }),
  },
};

const output = group<Output>('Output', 'The make-up amplifier after the drain.', {
  gainDb: quantity('dB', -60, 60, 0, 'Gain; 0 dB is transparent.'),
  gainBandwidthHz: absentOr('Hz', 1e3, 1e12, 'Gain-bandwidth product; null is ideal.'),
  slewVPerSec: absentOr('V/s', 100, 1e12, 'Slew rate; null is ideal.'),
  swingV: absentOr('V', 0.1, 1000, 'Largest output either side of 0 V; null has no limit.'),
});

export const variantSchema: Group = group<Variant>(
  'Variant',
  'One complete set of circuit values, heard and measured beside the others.',
  {
    name: text(24, 'A', 'Name of the variant, different from the others: A to D by custom.'),
    device,
    devices: {
      kind: 'list',
      noun: 'devices',
      description: 'Left and right, in place of device, where the two channels have different parts.',
      item: device,
      min: 2,
      max: 2,
    },
    cell,
    control,
    output,
  },
  { presence: { name: 'required', device: 'required', devices: 'optional', cell: 'required' } },
);

export const designSchema: Group = group<Design>(
  'Design',
  'A gain cell with a junction FET as voltage-controlled resistor, in up to four variants. All values in SI units.',
  {
    fettle: choice([VERSION], VERSION, "Version of the document's layout."),
    title: text(80, 'Untitled design', 'Title of the design.'),
    fullScaleV: quantity('V', 1e-4, 100, 0.2, "Voltage at the cell's input for a digital sample of 1.0, peak."),
    tempC: quantity('°C', -55, 150, 25, 'Temperature at which the cell works.'),
    oversampling: choice([1, 2, 4, 8, 16], 8, 'Steps that the circuit is solved in for each sample of the sound.'),
    noise: optional('Noise', 'Thermal noise of the parts, sample by sample.', 'No noise.', {
      thermal: group<Member<Noise, 'kind', 'thermal'>>('ThermalNoise', 'Noise of every resistor and of the channel.', {
        seed: quantity('', 0, 4294967295, 1, 'Number from which the noise is computed: the same one gives the same noise.'),
      }),
    }),
    variants: { kind: 'list', noun: 'variants', description: 'Up to four sets of circuit values.', item: variantSchema, min: 1, max: 4 },
  },
  { presence: { fettle: 'required', variants: 'required' }, rules: [namesDiffer] },
);

/** The schema of a design file, JSON Schema draft 2020-12. Agreements between fields that it cannot state stand in the descriptions. */
export function jsonSchema(): object {
  return { $schema: 'https://json-schema.org/draft/2020-12/schema', ...toJsonSchema(designSchema) };
}
