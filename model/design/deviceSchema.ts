/** The document's part that describes a junction FET. */
import { choice, type Group, group, quantity, type Rule } from './kinds.ts';
import type { Device, Junction } from './types.ts';

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

const junction = group<Junction>('Junction', 'Each of the two gate junctions.', {
  reverseA: quantity('A', 0, 1e-6, 1e-14, 'Saturation current. 0: the junction never conducts.'),
  ideality: quantity('', 1, 3, 1, 'Ideality factor (emission coefficient).'),
  leakageS: quantity('S', 0, 1e-6, 1e-12, 'Leakage conductance across the junction.'),
});

export const device: Group = group<Device>(
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
