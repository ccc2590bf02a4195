/** The document's part that describes what moves the gate. */
import { choice, flag, group, type Member, quantity, type Rule, union } from './kinds.ts';
import type { Control } from './types.ts';
import { plainly } from './wording.ts';

const SHAPES_WITH_EDGES: readonly unknown[] = ['square', 'rising', 'falling'];

/** The edges of a square, and a ramp with its flyback, must fit into a period. */
const edgesFit: Rule = {
  fault({ shape, rateHz, edgeSec }) {
    if (!SHAPES_WITH_EDGES.includes(shape) || typeof rateHz !== 'number' || typeof edgeSec !== 'number') return null;
    if (edgeSec * rateHz <= 0.5) return null;
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

const volts = (usual: number, description: string) => quantity('V', -100, 100, usual, description);

export const control = union(
  'Control',
  'What moves the gate: the voltage at the driver, before driverOhm and controlOhm.',
  {
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
          'Shape of the swing; a rising ramp runs from fromV to toV, a falling one the other way, and flies back within edgeSec.',
        ),
        rateHz: quantity('Hz', 0.01, 1000, 4, 'Cycles in a second.'),
        fromV: volts(-0.6, 'One end of the swing; the LFO starts midway, moving away from here, and on a falling ramp towards here.'),
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
      'A follower of the signal: a rectifier, a timing capacitor with attack and release resistors, a threshold and a gain.',
      {
        senses: choice(['input', 'output'], 'input', "Where the follower listens: the cell's input, or its output (a loop)."),
        rectifier: choice(['half', 'full'], 'full', 'Half-wave or full-wave rectifier.'),
        attackOhm: quantity('Ω', 1, 1e8, 4700, 'Resistor that charges timingF; their product is the attack time constant.'),
        releaseOhm: quantity('Ω', 100, 1e9, 220e3, 'Resistor across timingF; their product is the release time constant.'),
        timingF: quantity('F', 1e-12, 1e-2, 1e-6, 'Timing capacitor, charged to the level of the signal.'),
        thresholdV: quantity('V', 0, 100, 0.05, 'Voltage on timingF from which the control moves.'),
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
  'source',
);
