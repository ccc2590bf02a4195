import { describe, expect, test } from 'vitest';
import { advanceCell, type Cell, compileCell, createCell, overdriveV } from '../../../model/cell/cell.ts';
import { searched } from '../../../model/cell/kernels/channel.ts';
import * as L from '../../../model/cell/kernels/layout.ts';
import { GRADUAL_CONDUCTOR } from '../../../model/cell/kernels/gradual.ts';
import { bisect, bisectCurrent, currents } from '../../../model/cell/kernels/ports.ts';
import { SMOOTH_CONDUCTOR } from '../../../model/cell/kernels/smooth.ts';
import { SQUARE_CONDUCTOR } from '../../../model/cell/kernels/square.ts';
import { shuntCircuit } from '../../../model/cell/shunt.ts';
import { atTemperature } from '../../../model/device/temperature.ts';
import { Dice } from '../../fuzz/dice.ts';
import { randomDesign } from '../../fuzz/randomDesign.ts';
import { Witness } from '../../fuzz/witness.ts';

const CONDUCTORS = { square: SQUARE_CONDUCTOR, gradual: GRADUAL_CONDUCTOR, smooth: SMOOTH_CONDUCTOR };
const CIRCUITS = 200;
const POINTS = 10;

/** Passive random cells, with where ports.ts and channel.ts find their numbers. */
function* cells(first: number, circuits = CIRCUITS) {
  for (let seed = first; seed < first + circuits; seed++) {
    const dice = new Dice(seed);
    const { variants, tempC } = randomDesign(dice, dice.chance(0.5) ? 'board' : 'wild');
    const { cell: board, device: drawn } = variants[0];
    const device = { ...drawn, grading: 0 };
    const circuit = shuntCircuit(board, atTemperature(device, tempC).device);
    const cell = createCell(compileCell(circuit, device, tempC), 1 / dice.decades(8000, 6e6));
    if (!new Witness(cell, circuit).isPassive()) continue;
    const row = L.rowLayout(cell.stateCount);
    const all = L.coefficientLayout(cell.stateCount);
    yield { seed, dice, cell, aI: row.current, bI: row.width + row.current, device: all.device, junction: all.junction };
  }
}

/** Overdrives without currents, V: volts around the part's own, or up to 1 kV. */
function freeV(dice: Dice, cell: Cell): number {
  const gateOffV = cell.values[cell.numbers.plan.values.length + 1];
  return dice.chance(0.5) ? dice.between(-2, 2) - gateOffV : dice.decades(1e-3, 1000) * Math.sign(dice.sign());
}

test('Newton at the ports finds what the bisection behind it finds, to 1e-9 of the voltages that would stand there without currents', () => {
  let compared = 0;
  for (const { seed, dice, cell, aI, bI, device, junction } of cells(1)) {
    const { coefficients: c, numbers } = cell;
    for (let i = 0; i < POINTS; i++) {
      const a = freeV(dice, cell);
      const b = freeV(dice, cell);
      const newton = new Float64Array(L.STATE_SLOTS);
      const halved = new Float64Array(L.STATE_SLOTS);
      newton[L.GIVEN_A] = a;
      newton[L.GIVEN_B] = b;
      searched(c, numbers.table, device, aI, bI, newton, 0);
      CONDUCTORS[numbers.law](c, numbers.table, device, aI, bI, junction, newton, 0);
      if (newton[L.FALLBACKS] > 0 || c[bI] < 0) continue;
      halved[L.GIVEN_A] = a;
      halved[L.GIVEN_B] = b;
      bisect(c, numbers.table, device, aI, bI, junction, halved, 0, false);
      const allowed = 1e-9 * (1 + Math.abs(a) + Math.abs(b));
      expect(Math.abs(newton[L.OVERDRIVE_S] - halved[L.OVERDRIVE_S]), `seed ${seed}, source`).toBeLessThan(allowed);
      expect(Math.abs(newton[L.OVERDRIVE_D] - halved[L.OVERDRIVE_D]), `seed ${seed}, drain`).toBeLessThan(allowed);
      compared += 1;
    }
  }
  expect(compared).toBeGreaterThan(0.8 * CIRCUITS * POINTS);
}, 60_000);

test("the kernels' channel current is what the search behind it finds, to 1 μV at the ports", () => {
  let compared = 0;
  for (const { seed, dice, cell, aI, bI, device } of cells(5001)) {
    const { coefficients: c, numbers } = cell;
    for (let i = 0; i < POINTS; i++) {
      const signal = Float64Array.of(dice.decades(1e-3, 1000) * dice.sign());
      advanceCell(cell, signal, Float64Array.of(dice.decades(0.1, 100) * dice.sign()), 0, 1);
      const conducts = cell.state[cell.slots + L.JUNCTION_S] !== 0 || cell.state[cell.slots + L.JUNCTION_D] !== 0;
      if (conducts || c[bI] < 0) continue;
      const current = cell.state[cell.slots + L.CHANNEL_A];
      const a = overdriveV(cell, 'source') - c[aI] * current;
      const b = overdriveV(cell, 'drain') - c[bI] * current;
      const found = new Float64Array(L.STATE_SLOTS);
      found[L.GIVEN_A] = a;
      found[L.GIVEN_B] = b;
      searched(c, numbers.table, device, aI, bI, found, 0);
      const missedV = (c[bI] - c[aI]) * Math.abs(found[L.GIVEN_FREE] - current);
      expect(missedV, `seed ${seed}`).toBeLessThan(1e-6 + 1e-12 * (Math.abs(a) + Math.abs(b)));
      compared += 1;
    }
  }
  expect(compared).toBeGreaterThan(0.2 * CIRCUITS * POINTS);
}, 60_000);

describe('where more than the drain is fed back', () => {
  /** A device of the square law, β 1 mA/V², no junctions; overdrives 3 V and b without currents, −1 kΩ and γ at the two ends. */
  function searchedA(b: number, gammaOhm: number): number {
    const row = L.rowLayout(0);
    const all = L.coefficientLayout(0);
    const c = new Float64Array(all.length);
    c[row.current] = -1000;
    c[row.width + row.current] = gammaOhm;
    c[all.device + L.SCALE] = 1e-3;
    c[all.device + L.INVERSE_NVT] = 40;
    for (const on of [L.ON_V, L.JUNCTION_ON_V, L.CLAMP_ON_V]) c[all.device + on] = Number.POSITIVE_INFINITY;
    const s = new Float64Array(L.STATE_SLOTS);
    s[L.GIVEN_A] = 3;
    s[L.GIVEN_B] = b;
    bisectCurrent(c, new Float64Array(0), all.device, row.current, row.width + row.current, all.junction, s, 0);
    return (s[L.OVERDRIVE_S] - 3) / -1000;
  }

  test('the search over the channel current finds a root of the quadratic', () => {
    // I = β((a − αI)² − (b + γI)²) while both ends are ohmic: a textbook quadratic.
    for (const [b, gamma] of [
      [2, -500],
      [2.5, -900],
      [2.9, -200],
    ]) {
      const square = 1e-3 * (1e6 - gamma * gamma);
      const linear = 1e-3 * (-6000 - 2 * b * gamma) - 1;
      const constant = 1e-3 * (9 - b * b);
      const root = (2 * constant) / (-linear + Math.sqrt(linear * linear - 4 * square * constant));
      expect(Math.abs(searchedA(b, gamma) / root - 1)).toBeLessThan(1e-12);
    }
  });

  test('with junctions, of any law, what it finds satisfies both equations to 1e-9 of the voltages without currents', () => {
    let compared = 0;
    for (const { seed, dice, cell, aI, bI, device, junction } of cells(20001, 800)) {
      const { coefficients: c, numbers } = cell;
      if (c[bI] >= 0) continue;
      for (let i = 0; i < POINTS; i++) {
        const a = freeV(dice, cell);
        const b = freeV(dice, cell);
        const s = new Float64Array(L.STATE_SLOTS);
        s[L.GIVEN_A] = a;
        s[L.GIVEN_B] = b;
        bisectCurrent(c, numbers.table, device, aI, bI, junction, s, 0);
        currents(c, numbers.table, device, s, 0);
        for (const [own, free, row, byChannel] of [
          [s[L.OVERDRIVE_S], a, junction, aI],
          [s[L.OVERDRIVE_D], b, junction + L.JUNCTION_WIDTH, bI],
        ]) {
          const parts = [own, -free, -c[byChannel] * s[L.CHANNEL_A], -c[row] * s[L.JUNCTION_S], -c[row + 1] * s[L.JUNCTION_D]];
          const gross = parts.reduce((sum, part) => sum + Math.abs(part), 0);
          expect(Math.abs(parts.reduce((sum, part) => sum + part, 0)), `seed ${seed}`).toBeLessThan(1e-9 * (1 + gross));
        }
        compared += 1;
      }
    }
    expect(compared).toBeGreaterThan(40);
  }, 60_000);
});
