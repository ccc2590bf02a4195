/** Parts that a board may have or lack: the words for each, whether it is fitted, and the values that fit it or take it out. */
import type { Cell, Control, Variant } from '../../model/design/types.ts';

export type Changes = readonly (readonly [path: string, value: unknown])[];

export interface BoardPart {
  readonly words: string;
  fitted(cell: Cell): boolean;
  fit(variant: Variant): Changes;
  takeOut(variant: Variant): Changes;
}

/** A part that one value of the cell tells of. */
function part(words: string, path: string, absent: unknown, fresh: unknown, fitted: (cell: Cell) => boolean): BoardPart {
  return { words, fitted, fit: () => [[`cell.${path}`, fresh]], takeOut: () => [[`cell.${path}`, absent]] };
}

export const BOARD_PARTS: readonly BoardPart[] = [
  part('pickup', 'feed.kind', 'direct', 'pickup', ({ feed }) => feed.kind === 'pickup'),
  part('previous stage', 'feed.kind', 'direct', 'stage', ({ feed }) => feed.kind === 'stage'),
  part('pad', 'pad.kind', 'none', 'divider', ({ pad }) => pad.kind === 'divider'),
  part('follower', 'buffer.kind', 'none', 'follower', ({ buffer }) => buffer.kind === 'follower'),
  part('coupling', 'coupling.kind', 'none', 'capacitor', ({ coupling }) => coupling.kind === 'capacitor'),
  part('drain return', 'drainReturnOhm', null, 1e6, ({ drainReturnOhm }) => drainReturnOhm !== null),
  part('output coupling', 'outputCouplingF', null, 1e-6, ({ outputCouplingF }) => outputCouplingF !== null),
  part('driver resistance', 'driverOhm', 0, 1e3, ({ driverOhm }) => driverOhm > 0),
  part('smoothing', 'smoothing.kind', 'none', 'rc', ({ smoothing }) => smoothing.kind === 'rc'),
  part('gate clamp', 'clamp.kind', 'none', 'diode', ({ clamp }) => clamp.kind === 'diode'),
  {
    words: 'half supply',
    fitted: ({ reference }) => reference.kind === 'halfSupply',
    // The control moves with the source pin, so that the gate stays where it was from there.
    fit: ({ control }) => [
      ['cell.reference.kind', 'halfSupply'],
      ['control', shifted(control, FRESH_PIN_V)],
    ],
    takeOut: ({ cell, control }) => [
      ['cell.reference.kind', 'ground'],
      ['control', shifted(control, -pinV(cell))],
    ],
  },
  part('shared ground', 'sharedGround.kind', 'none', 'shared', ({ sharedGround }) => sharedGround.kind === 'shared'),
  part('stray capacitance', 'strayF', 0, 1e-12, ({ strayF }) => strayF > 0),
];

/** Of a divided supply as it is fitted: half of 9 V. */
const FRESH_PIN_V = 4.5;

function pinV({ reference }: Cell): number {
  if (reference.kind === 'ground') return 0;
  return (reference.supplyV * reference.lowerOhm) / (reference.upperOhm + reference.lowerOhm);
}

function shifted(control: Control, byV: number): Control {
  const moved = (volts: number) => Number((volts + byV).toPrecision(6));
  switch (control.source) {
    case 'fixed':
      return { ...control, controlV: moved(control.controlV) };
    case 'lfo':
      return { ...control, fromV: moved(control.fromV), toV: moved(control.toV) };
    case 'envelope':
      return { ...control, restV: moved(control.restV), limitV: moved(control.limitV) };
    case 'external':
      return { ...control, offsetV: moved(control.offsetV) };
  }
}
