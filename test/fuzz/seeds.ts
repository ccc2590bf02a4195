/** Seeds that have failed, each kept for ever and replayed in CI, with what it found. */
export const CELL_SEEDS: readonly (readonly [seed: number, found: string])[] = [
  [148, 'no operating point: a ground path of 0.1 mΩ made the network at rest singular'],
  [177, 'junctions of 0.1 A reverse current through a ground path of 0.1 mΩ'],
  [716, 'a driver of 16 μΩ beside picofarads'],
  [1177, 'more than the drain fed back: the path from where nothing conducts turns back'],
  [1274, 'an overdrive beyond cut-off without currents: the sums of the ohmic solution cancelled'],
  [1484, 'a pickup of 100 H: 900 V of L/h·I in the sums'],
  [1733, 'a pickup of 100 H with a bias of 1 mA'],
  [2276, '27 fF at the gate beside a ground path of 0.1 mΩ'],
  [3110, 'a buffer and a stray capacitance feed back 1.5 times the drain: the search found no solution'],
  [3235, 'values moved from 10 MΩ to 24 μΩ'],
  [5356, 'a ground path of 100 Ω moved to 0.6 mΩ in one sample: 23 kV at the output, in what the witness held to be a circuit of volts'],
  [5581, "Newton's last step left 1.2 pA where the law's tail is 32 mV wide"],
  [5996, 'the smooth law’s table where VGS(off) is no larger than its tail'],
  [6701, 'the roots of the square law’s equation nearly one: 1 500 V of overdrive behind 7 kΩ, seven digits lost in the discriminant'],
  [8897, '45 A through a ground path of 0.1 mΩ, of which the step’s equations left rounding in a state that does not know it'],
  [8612, 'a feedback loop of 10 Ω that floats on megohms: 45 pV of rounding at the output, where the witness allowed 7'],
  [29914, 'a bias of 1 mA through 10 MΩ: 10 kV in the network’s sums left 3 pV'],
  [35524, '1 Ω beside 100 MΩ: the sum of both in a node’s equation lost nine digits of the smaller'],
  [37995, 'the smooth law’s table at its error, which the witness had rounded down'],
];

export const CHAIN_SEEDS: readonly (readonly [seed: number, found: string])[] = [
  [1, 'a move over decades: interpolated matrices grew until the state was lost'],
  [45, 'the same within 12 samples of the move'],
  [97, 'the same in the last slice of a move'],
  [164, 'the same with a follower of the input'],
  [211, 'a buffered source pin on a ground path of 100 Ω: the rest was solved at 1e27 V'],
  [1017, 'an operating point moved behind a slow coupling capacitor'],
  [2101, 'an external control of 1 MV through the ground path'],
];
