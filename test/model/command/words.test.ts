import { spawn } from 'node:child_process';
import { existsSync, openSync, readFileSync, statSync } from 'node:fs';
import { expect, test } from 'vitest';
import { jsonSchema } from '../../../model/design/schema.ts';
import { cellA, ended, FETTLE, newFolder, ROOT } from './running.ts';

test('without words the help goes to stderr with exit code 2; asked for, to stdout with 0', async () => {
  const folder = newFolder();
  const none = await folder.fettle();
  const asked = await folder.fettle('--help');
  expect(none).toMatchObject({ code: 2, stdout: '' });
  expect(asked).toMatchObject({ code: 0, stderr: '', stdout: none.stderr });
  for (const name of ['render DESIGN IN.wav OUT.wav', 'measure DESIGN', 'schema']) expect(asked.stdout).toContain(`fettle ${name}`);
});

test.each([
  ['render', ['--variant NAME', '--set PATH=VALUE', '--format FORMAT', "Its samples are of IN's kind"]],
  ['measure', ['--toneHz HZ', '--toneV V', '--controlV V', '--atOutput', '--json', 'V peak', 'null where the channel is cut off']],
  ['schema', ['JSON Schema']],
])('the help of %s tells its options and what comes out', async (name, parts) => {
  const { code, stdout, stderr } = await newFolder().fettle(name, '--help');
  expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
  for (const part of parts) expect(stdout).toContain(part);
});

test('the version is that of the package', async () => {
  const manifest = JSON.parse(readFileSync(`${ROOT}/package.json`, 'utf8'));
  expect(await newFolder().fettle('--version')).toMatchObject({ code: 0, stdout: `${manifest.version}\n`, stderr: '' });
});

test('the package names a file that can be run, and the source runs under tsx as well', async () => {
  const manifest = JSON.parse(readFileSync(`${ROOT}/package.json`, 'utf8'));
  expect(`${ROOT}/${manifest.bin.fettle}`.replace('//', '/')).toBe(FETTLE);
  if (process.platform !== 'win32') expect(statSync(FETTLE).mode & 0o111).toBe(0o111);
  const child = spawn('npm', ['run', '--silent', 'fettle', '--', 'measure', '--help'], { cwd: ROOT, shell: process.platform === 'win32' });
  expect(await ended(child)).toMatchObject({ code: 0, stdout: (await newFolder().fettle('measure', '--help')).stdout });
});

test('the schema is that of the design, one JSON document', async () => {
  const { code, stdout, stderr } = await newFolder().fettle('schema');
  expect({ code, stderr }).toEqual({ code: 0, stderr: '' });
  expect(JSON.parse(stdout)).toEqual(jsonSchema());
});

test('a reader that has gone is no fault', async () => {
  const child = spawn(process.execPath, [FETTLE, 'schema']);
  const done = ended(child);
  child.stdout.destroy();
  expect(await done).toMatchObject({ code: 0, signal: null, stderr: '' });
});

test.skipIf(!existsSync('/dev/full'))('a full disk behind stdout is a failure and said so', async () => {
  const child = spawn(process.execPath, [FETTLE, 'schema'], { stdio: ['ignore', openSync('/dev/full', 'w'), 'pipe'] });
  const { code, stderr } = await ended(child);
  expect(code).toBe(1);
  expect(stderr).toMatch(/^stdout cannot be written: ENOSPC/);
});

test.each([
  [['mesure', 'a.json'], '"mesure" is not a command; expected render, measure or schema (measure, perhaps)'],
  [['play'], '"play" is not a command; expected render, measure or schema'],
  [['measure', 'a.json', '--tonehz', '5'], '--tonehz is not an option; expected --toneHz, perhaps'],
  [['measure', 'a.json', '-x'], '-x is not an option; fettle --help lists them'],
  [
    ['render', 'a.json', 'b', 'c', '--json'],
    '--json is not an option of render; expected --variant, --set, --format, --dither, --control or --residual',
  ],
  [['schema', '--json'], '--json is not an option of schema; it has none'],
  [['measure'], 'measure is given no files; expected 1 (DESIGN)'],
  [['render', 'a.json'], 'render is given 1 file; expected 3 (DESIGN IN.wav OUT.wav)'],
  [['measure', 'a.json', 'b.json'], 'measure is given 2 files; expected 1 (DESIGN): "b.json" is too many'],
  [['measure', 'a.json', '--toneV'], '--toneV has no value; expected V after it'],
  [['measure', 'a.json', '--toneV', '--json'], '--toneV has no value; expected V after it'],
  [['measure', 'a.json', '--json=yes'], '--json is "yes"; expected the option alone, without a value'],
  [['measure', 'a.json', '--variant', 'A', '--variant', 'B'], '--variant is given twice; expected once'],
  [['measure', 'a.json', '--toneHz', 'loud'], '--toneHz: “loud” is not a frequency. Write 4.2, 4.2 Hz or 1k5.'],
  [['measure', 'a.json', '--toneV', '0'], '--toneV is 0; expected 1 nV to 1 kV peak'],
  [['measure', 'a.json', '--toneHz', '0'], '--toneHz is 0; expected 0.1 Hz to 1 MHz'],
  [['measure', 'a.json', '--controlV', '-200'], '--controlV is -200; expected −100 V to 100 V'],
  [['measure', 'a.json', '--variant', 'C'], '--variant is "C"; a.json has "A", "B"'],
  [['measure', 'a.json', '--set', 'cell.seriesOhm'], '--set is "cell.seriesOhm"; expected PATH=VALUE such as cell.seriesOhm=6k8'],
  [['measure', 'a.json', '--set', 'cell.seriesOhm=6q8'], '--set: cell.seriesOhm: “6q8” is not a resistance. Write 1M2, 1.2 M or 1200 k.'],
  [['measure', 'a.json', '--set', 'cell.seriesOhm=-5'], '--set: cell.seriesOhm is -5; expected 1 Ω to 100 MΩ'],
  [
    ['measure', 'a.json', '--set', 'fullScaleV=1'],
    '--set: fullScaleV does not exist; the top level has name, device, devices, cell, control, output. Paths start at the variant; those of the design itself with design.',
  ],
])('%j is refused with a sentence and exit code 2', async (words, sentence) => {
  const folder = newFolder();
  const [variant] = cellA().variants;
  folder.write('a.json', JSON.stringify({ ...cellA(), variants: [variant, { ...variant, name: 'B' }] }));
  expect(await folder.fettle(...words)).toEqual({ code: 2, signal: null, stdout: '', stderr: `${sentence}\n` });
});
