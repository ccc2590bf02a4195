/** Values of Cell A: computed apart from this project with a root finder and a Fourier transform (scipy's brentq, numpy's FFT). */
import { expect, test } from 'vitest';
import type { Control, Design } from '../../../model/design/types.ts';
import { cellA, type Folder, newFolder } from './running.ts';

interface Reading {
  gainDb: number;
  thdFundamental: number;
  thdTotal: number;
  fundamentalV: number;
  dcV: number;
  restDcV: number;
  harmonics: { n: number; amplitudeV: number; db: number | null; phaseRad: number }[];
  rdsOhm: number | null;
  vgsV: number;
  regions: { ohmic: number; saturated: number; cutoff: number; gateOn: number };
}

function folderWith(design: Design): Folder {
  const folder = newFolder();
  folder.write('a.json', JSON.stringify(design));
  return folder;
}

async function readingOf(folder: Folder, ...words: string[]): Promise<Reading> {
  const { code, stdout, stderr } = await folder.fettle('measure', 'a.json', '--json', ...words);
  expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
  return JSON.parse(stdout);
}

const fraction = (k: number) => ['--set', 'cell.feedback.kind=buffered', '--set', `cell.feedback.fraction=${k}`];
const squared = (x: number) => x * x;

// Bounds: half of the last digit that the independent value was noted with.
test.each([
  { vgs: '0', k: 0, gainDb: -32.255, h2: -48.03 },
  { vgs: '-0.75', k: 0, gainDb: -26.432, h2: -36.38, h3: -66.7 },
  { vgs: '-1.2', k: 0, gainDb: -18.669, h2: -20.71 },
  { vgs: '-1.4', k: 0.5, h3: -45.2 },
  { vgs: '0', k: 0.505, h2: -88.0 },
  { vgs: '-0.75', k: 0.505, h2: -76.4 },
  { vgs: '-1.2', k: 0.505, h2: -61.7 },
])('Cell A at VGS $vgs V, k $k, 1 V peak reads as computed independently', async ({ vgs, k, gainDb, h2, h3 }) => {
  const reading = await readingOf(folderWith(cellA()), '--toneV', '1', '--controlV', vgs, ...fraction(k));
  if (gainDb !== undefined) expect(Math.abs(reading.gainDb - gainDb)).toBeLessThan(0.0005);
  if (h2 !== undefined) expect(Math.abs((reading.harmonics[1].db as number) - h2)).toBeLessThan(k === 0 ? 0.005 : 0.05);
  if (h3 !== undefined) expect(Math.abs((reading.harmonics[2].db as number) - h3)).toBeLessThan(0.05);
});

test.each([
  ['0', -32.256],
  ['-0.75', -26.444],
  ['-1.2', -19.085],
])(
  'with half of the drain fed back the square law has no harmonics at VGS %s V: they are zero, and their level null',
  async (vgs, gainDb) => {
    const reading = await readingOf(folderWith(cellA()), '--toneV=1', `--controlV=${vgs}`, ...fraction(0.5));
    expect(Math.abs(reading.gainDb - gainDb)).toBeLessThan(0.0005);
    expect(reading.harmonics.slice(1)).toEqual(
      [2, 3, 4, 5, 6, 7, 8, 9].map((n) => ({ n, amplitudeV: 0, db: null, phaseRad: expect.any(Number) })),
    );
    expect(reading.thdTotal).toBe(0);
  },
);

test('--json prints one line with the fields that the help names, and they agree with one another', async () => {
  const folder = folderWith(cellA());
  const { stdout } = await folder.fettle('--json', 'measure', '--toneHz', '1k', '--toneV=500m', '--controlV', '-0.75', '--', 'a.json');
  expect(stdout).toMatch(/^\{.*\}\n$/);
  const reading: Reading = JSON.parse(stdout);
  const names =
    'gainDb fundamentalV dcV restDcV thdFundamental thdTotal harmonics rdsOhm vgsV regions gridPoints converged fundamentalError harmonicsError settledByTime'.split(
      ' ',
    );
  expect(Object.keys(reading).sort()).toEqual(names.sort());
  expect(Object.keys(reading.regions)).toEqual(['ohmic', 'saturated', 'cutoff', 'gateOn']);
  expect(reading.harmonics.map((each) => Object.keys(each).join())).toEqual(Array(9).fill('n,amplitudeV,db,phaseRad'));
  const above = reading.harmonics.slice(1).reduce((sum, { amplitudeV }) => sum + squared(amplitudeV), 0);
  expect(reading.thdFundamental).toBeCloseTo(Math.sqrt(above) / reading.fundamentalV, 12);
  expect(reading.thdTotal).toBeCloseTo(Math.sqrt(above / (above + squared(reading.fundamentalV))), 12);
  expect(reading.gainDb).toBeCloseTo(20 * Math.log10(reading.fundamentalV / 0.5), 9);
  expect(reading.vgsV).toBeCloseTo(-0.75, 9);
  // r = r0/(1 − VGS/VP), r0 = |VP|/(2·IDSS) = 250 Ω (Vishay document 70293)
  expect(reading.rdsOhm).toBeCloseTo(500, 6);
});

test('cut off, the slope resistance has no number: null in JSON, words for people', async () => {
  const folder = folderWith(cellA());
  const reading = await readingOf(folder, '--controlV', '-9');
  expect(reading.rdsOhm).toBeNull();
  expect(reading.regions).toEqual({ ohmic: 0, saturated: 0, cutoff: 1, gateOn: 0 });
  expect((await folder.fettle('measure', 'a.json', '--controlV', '-9')).stdout).toMatch(/^Channel +cut off {2}at rest$/m);
});

test('--atOutput counts the make-up gain, the drain does not', async () => {
  const folder = folderWith(cellA());
  const drain = await readingOf(folder, '--set', 'output.gainDb=18');
  const output = await readingOf(folder, '--set', 'output.gainDb=18', '--atOutput');
  expect(output.gainDb - drain.gainDb).toBeCloseTo(18, 9);
  expect(output.thdFundamental).toBeCloseTo(drain.thdFundamental, 12);
});

test('values that agree only with one another are set together, in the variant and in the design', async () => {
  const folder = folderWith(cellA());
  const p = ['--set', 'device.channel=p', '--set', 'device.gateOffV=1V5', '--set', 'control.controlV=0.75'];
  const mirrored = await readingOf(folder, ...p);
  const plain = await readingOf(folder, '--controlV', '-0.75');
  expect(mirrored.gainDb).toBeCloseTo(plain.gainDb, 9);
  expect(mirrored.dcV).toBeCloseTo(-plain.dcV, 12);
  const warm = await readingOf(folder, '--controlV', '-0.75', '--set', 'design.tempC=75');
  expect(warm.rdsOhm).not.toBeCloseTo(500, 0);
  expect(JSON.parse(folder.read('a.json').toString())).toEqual(cellA());
});

test('the variant named is measured, the first when none is', async () => {
  const [variant] = cellA().variants;
  const other = { ...variant, name: 'Half the resistor', cell: { ...variant.cell, seriesOhm: 5000 } };
  const folder = folderWith({ ...cellA(), variants: [variant, other] });
  const b = await readingOf(folder, '--variant', 'Half the resistor');
  expect(b).toEqual(await readingOf(folder, '--set', 'cell.seriesOhm=5k'));
  expect(await readingOf(folder)).toEqual(await readingOf(folder, '--variant=A'));
});

const LFO: Control = { source: 'lfo', shape: 'sine', rateHz: 4, fromV: -0.2, toV: -1.2, edgeSec: 0.005 };
const EXTERNAL: Control = { source: 'external', fullScaleV: 0.4, offsetV: -0.9 };

test.each([
  ['fixed', cellA(), [], /^Control +−1\.20 V {2}fixed, as in the design$/m],
  ['midway', cellA(LFO), [], /^Control +−700 mV {2}the LFO midway between −1\.20 V and −200 mV$/m],
  ['at its offset', cellA(EXTERNAL), [], /^Control +−900 mV {2}the external control at its offset$/m],
  ['given', cellA(LFO), ['--controlV', '-50m'], /^Control +−50\.0 mV {2}from --controlV$/m],
])('the reading for people says where the control stands: %s', async (_, design, words, line) => {
  const { code, stdout, stderr } = await folderWith(design).fettle('measure', 'a.json', ...words);
  expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
  expect(stdout.replaceAll('\u2009', ' ')).toMatch(line);
});

test('the reading for people names units, peak values and both divisors', async () => {
  const { stdout } = await folderWith(cellA()).fettle('measure', 'a.json', '--toneV', '1', '--controlV', '-0.75');
  const plain = stdout.replaceAll('\u2009', ' ');
  expect(plain).toMatch(/^Test, variant A\n/);
  expect(plain).toMatch(/^Tone +1\.00 V {2}peak, 1\.00 kHz, at the cell's input$/m);
  expect(plain).toMatch(/^Gain +−26\.4 dB$/m);
  expect(plain).toMatch(/^THD +1\.52 % {2}of the fundamental, −36\.4 dB\n +1\.52 % {2}of the total, as IEC 60268-3 divides, −36\.4 dB$/m);
  expect(plain).toMatch(/^ {2}H2 +−36\.4 dB {2}re the fundamental; \d+ μV peak at 0°$/m);
  expect(plain).toMatch(/^Ohmic +100 % {2}of the period$/m);
});
