/** The board around the cell, as the rows of parts that are fitted. What a plain cell has stands in its own drawing. */
import type { Cell, Variant } from '../../model/design/types.ts';
import type { Ladder, LadderPart, PartValue } from './ladder.ts';

/** Which ends of the cell's own drawing go on in a row of the board. */
export interface BoardRows {
  readonly input: boolean;
  readonly output: boolean;
  readonly control: boolean;
  /** The source pin does not stand on 0 V. */
  readonly source: boolean;
}

export function boardRows({ cell }: Variant): BoardRows {
  const { feed, pad, buffer, coupling, drainReturnOhm, outputCouplingF, driverOhm, smoothing, reference, sharedGround } = cell;
  return {
    input: feed.kind !== 'direct' || pad.kind !== 'none' || buffer.kind !== 'none' || coupling.kind !== 'none',
    output: drainReturnOhm !== null || outputCouplingF !== null,
    control: driverOhm > 0 || smoothing.kind !== 'none',
    source: reference.kind !== 'ground' || sharedGround.kind !== 'none',
  };
}

const SOURCE_PIN = 'J1, source';

/** In the order of the signal, then of the control, then what stands on its own. */
export function boardLadders(variant: Variant): Ladder[] {
  const { cell } = variant;
  const rows = boardRows(variant);
  return [
    ...(rows.input ? [inputLadder(cell)] : []),
    ...(rows.output ? [outputLadder(cell, rows.source)] : []),
    ...(rows.control ? [controlLadder(cell)] : []),
    ...sourceLadders(cell),
    ...(rows.source && cell.drainReturnOhm !== null ? [link('Drain return', 'drain', RETURN, SOURCE_PIN)] : []),
    ...(cell.clamp.kind === 'diode' ? [clampLadder] : []),
    ...(cell.strayF > 0 ? [link('Stray capacitance', 'driver', STRAY, 'drain')] : []),
  ];
}

function value(path: string, name: string, label: string, more: Partial<PartValue> = {}): PartValue {
  return { path: `cell.${path}`, name, label, short: label, ...more };
}

type Series = Extract<LadderPart, { at: 'series' }>;

function series(symbol: Series['symbol'], partValue: PartValue, under?: PartValue): Series {
  return { at: 'series', symbol, value: partValue, ...(under && { under }) };
}

function shunt(symbol: 'resistorUpright' | 'capacitor' | 'diode', ...values: readonly PartValue[]): LadderPart {
  return { at: 'shunt', symbol, values };
}

const RETURN = series('resistor', value('drainReturnOhm', 'return', 'Drain return resistor'));
const STRAY = series('capacitorAcross', value('strayF', 'stray', 'Capacitance from the driver to the drain', { zeroIsAbsent: true }));

/** One part between two named places. */
function link(words: string, from: string, part: LadderPart, to: string): Ladder {
  return { words, parts: [{ at: 'start', words: from }, part, { at: 'end', words: to }], below: null };
}

function inputLadder(cell: Cell): Ladder {
  const { pad, buffer, coupling } = cell;
  const parts: LadderPart[] = [{ at: 'start', words: 'in', shows: 'inputPeakV' }, ...feedParts(cell)];
  if (pad.kind === 'divider') {
    parts.push(
      series('resistor', value('pad.upperOhm', 'pad', 'Upper resistor of the pad')),
      shunt('resistorUpright', value('pad.lowerOhm', 'pad', 'Lower resistor of the pad')),
    );
  }
  if (buffer.kind === 'follower') {
    const values = [
      value('buffer.offsetV', 'offset', 'Offset of the follower', { signed: true }),
      value('buffer.biasA', 'bias', 'Bias current of the follower', { signed: true }),
    ];
    parts.push({ at: 'stage', values });
  }
  if (coupling.kind === 'capacitor') {
    const leak = value('coupling.leakOhm', 'leaks', 'Leakage resistance of the coupling capacitor');
    parts.push(series('capacitorAcross', value('coupling.couplingF', 'coupling', 'Coupling capacitor'), leak));
  }
  parts.push({ at: 'end', words: 'to R1' });
  return { words: 'The input of the board', parts, below: 'ground' };
}

function feedParts({ feed }: Cell): LadderPart[] {
  const source = (name: string, label: string) => series('resistor', value('sourceOhm', name, label));
  switch (feed.kind) {
    case 'direct':
      return [source('source', 'Resistance of the signal source')];
    case 'pickup':
      return [
        series('inductor', value('feed.inductanceH', 'pickup', 'Inductance of the pickup')),
        source('winding', 'Winding resistance of the pickup'),
        shunt('capacitor', value('feed.windingF', 'winding', 'Winding capacitance of the pickup')),
        shunt('capacitor', value('feed.cableF', 'cable', 'Capacitance of the cable')),
        shunt('resistorUpright', value('feed.volumeOhm', 'volume', 'Volume control of the guitar')),
      ];
    case 'stage':
      return [
        source('source', 'Output resistance of the previous stage'),
        series('capacitorAcross', value('feed.couplingF', 'stage', 'Output capacitor of the previous stage')),
        shunt('resistorUpright', value('feed.bleedOhm', 'bleed', 'Resistor after the previous stage, to 0 V')),
      ];
  }
}

function outputLadder(cell: Cell, sourceApart: boolean): Ladder {
  const load = value('loadOhm', 'R4', 'R4, load at the drain');
  const loadF = value('loadF', 'C2', 'C2, load capacitance at the drain', { zeroIsAbsent: true });
  const parts: LadderPart[] = [{ at: 'start', words: 'drain' }];
  if (cell.drainReturnOhm !== null && !sourceApart)
    parts.push(shunt('resistorUpright', value('drainReturnOhm', 'return', 'Drain return resistor')));
  if (cell.outputCouplingF !== null) parts.push(series('capacitorAcross', value('outputCouplingF', 'output', 'Output coupling capacitor')));
  parts.push(...(cell.loadF > 0 ? [shunt('resistorUpright', load), shunt('capacitor', loadF)] : [shunt('resistorUpright', load, loadF)]));
  const makeUp = { path: 'output.gainDb', name: 'make-up', label: 'Make-up gain', short: 'Make-up', signed: true };
  parts.push({ at: 'stage', values: [makeUp] }, { at: 'end', words: 'out', shows: 'output' });
  return { words: 'The output of the board', parts, below: 'ground' };
}

function controlLadder({ driverOhm, smoothing }: Cell): Ladder {
  const parts: LadderPart[] = [{ at: 'generator' }];
  if (driverOhm > 0)
    parts.push(series('resistor', value('driverOhm', 'driver', 'Resistance of the control’s driver', { zeroIsAbsent: true })));
  if (smoothing.kind === 'rc') {
    parts.push(
      series('resistor', value('smoothing.smoothingOhm', 'smoothing', 'Smoothing resistor of the control')),
      shunt('capacitor', value('smoothing.smoothingF', 'smoothing', 'Smoothing capacitor of the control')),
    );
  }
  parts.push({ at: 'end', words: 'to R3' });
  return { words: 'The path of the control', parts, below: 'ground' };
}

/** What the source pin stands on. */
function sourceLadders({ reference, sharedGround }: Cell): Ladder[] {
  const ladders: Ladder[] = [];
  const shared = sharedGround.kind === 'shared';
  if (reference.kind === 'halfSupply') {
    ladders.push({
      words: 'The divided supply that the source pin stands on',
      parts: [
        { at: 'start', words: 'supply', shows: value('reference.supplyV', '', 'Supply voltage') },
        series('resistor', value('reference.upperOhm', 'upper', 'Upper resistor of the divided supply')),
        shunt('resistorUpright', value('reference.lowerOhm', 'lower', 'Lower resistor of the divided supply')),
        shunt('capacitor', value('reference.decouplingF', 'decoupling', 'Decoupling capacitor of the divided supply')),
        { at: 'end', words: SOURCE_PIN },
      ],
      below: shared ? { words: 'shared ground' } : 'ground',
    });
  }
  if (shared) {
    const draw = value('sharedGround.drawAPerV', 'draws', 'Current of the control in the shared ground, for each volt');
    const path = series('resistor', value('sharedGround.groundOhm', 'ground path', 'Resistance of the shared ground path'), draw);
    const from = reference.kind === 'halfSupply' ? 'shared ground' : SOURCE_PIN;
    ladders.push({
      words: 'The ground path that cell and control share',
      parts: [{ at: 'start', words: from }, path, { at: 'earth' }],
      below: null,
    });
  }
  return ladders;
}

const clampLadder: Ladder = {
  words: 'A diode from the gate to the source pin',
  parts: [
    { at: 'start', words: 'gate' },
    shunt(
      'diode',
      value('clamp.reverseA', 'reverse', 'Saturation current of the clamp diode'),
      value('clamp.ideality', 'ideality', 'Ideality of the clamp diode'),
    ),
  ],
  below: { words: SOURCE_PIN },
};
