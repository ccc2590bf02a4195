import { spawn } from 'node:child_process';
import { chmodSync, linkSync, mkdirSync, symlinkSync } from 'node:fs';
import { setTimeout as wait } from 'node:timers/promises';
import { pathToFileURL } from 'node:url';
import { expect, test } from 'vitest';
import { ended, FETTLE, type Folder, newFolder, ROOT, straightThrough } from './running.ts';
import { type Kind, soundOf, takeApart, wavOf } from './sound.ts';

const PLAIN: Kind = { bits: 16, float: false, channels: 1, rateHz: 48000 };
const POSIX = process.platform !== 'win32';

function folderWith(frames: number, kind = PLAIN): Folder {
  const folder = newFolder();
  folder.write('a.json', JSON.stringify(straightThrough()));
  folder.write('in.wav', wavOf(kind, soundOf(kind, frames)));
  folder.write('sound.json', wavOf(kind, soundOf(kind, frames)));
  mkdirSync(folder.at('there'));
  return folder;
}

const NO_FILE = 'there is no such file';

test.each([
  [['measure', 'none.json'], `none.json cannot be read: ${NO_FILE}`],
  [['measure', 'there'], 'there cannot be read: it is a folder; expected a file'],
  [['measure', 'a.json/b'], 'a.json/b cannot be read: part of its path is a file, not a folder'],
  [['measure', 'in.wav'], 'in.wav holds sound and no design; expected a design, or a WAV file with one inside'],
  [['measure', 'sound.json'], 'sound.json is not a text in UTF-8; expected a design'],
  [['render', 'a.json', 'none.wav', 'out.wav'], `none.wav cannot be read: ${NO_FILE}`],
  [['render', 'a.json', 'there', 'out.wav'], 'there cannot be read: it is a folder; expected a file'],
  [['render', 'a.json', 'in.wav', 'there'], 'there is a folder; expected a file or a new name'],
  [['render', 'a.json', 'in.wav', 'nowhere/out.wav'], 'nowhere/out.wav cannot be written: there is no folder nowhere'],
  [['render', 'a.json', 'in.wav', 'a.json'], 'a.json is the same file as a.json, which is only read; expected another name'],
])('%j is refused with exit code 2', async (words, sentence) => {
  const folder = folderWith(100);
  const before = folder.names();
  expect(await folder.fettle(...words)).toEqual({ code: 2, signal: null, stdout: '', stderr: `${sentence}\n` });
  expect(folder.names()).toEqual(before);
});

test.skipIf(!POSIX)('a file that may not be read is refused', async () => {
  const folder = folderWith(100);
  chmodSync(folder.at('a.json'), 0);
  // Nothing is closed to the superuser but this: memory that is not there.
  const closed = process.getuid?.() === 0 ? '/proc/self/mem' : 'a.json';
  const { code, stderr } = await folder.fettle('measure', closed);
  expect(code).toBe(2);
  expect(stderr).toMatch(/^\S+ cannot be read: .+\n$/);
});

test('a bad design has each fault on its own line', async () => {
  const folder = folderWith(0);
  const [variant] = straightThrough().variants;
  folder.write(
    'bad.json',
    JSON.stringify({ ...straightThrough(), tempC: 900, variants: [{ ...variant, cell: { ...variant.cell, seriesOhm: -5 } }] }),
  );
  const { code, stdout, stderr } = await folder.fettle('measure', 'bad.json', '--json');
  expect({ code, stdout }).toEqual({ code: 2, stdout: '' });
  expect(stderr.split('\n').sort()).toEqual([
    '',
    'bad.json: tempC is 900; expected −55 °C to 150 °C',
    'bad.json: variants[0].cell.seriesOhm is -5; expected 1 Ω to 100 MΩ',
  ]);
  folder.write('bad.json', '{"fettle": 1,');
  expect((await folder.fettle('measure', 'bad.json')).stderr).toMatch(/^bad\.json: Line 1, column 14 is not JSON: the file ends; expected/);
});

test.skipIf(!POSIX)('OUT is refused where it is IN by another path, a link or a second name', async () => {
  const folder = folderWith(100);
  const before = folder.read('in.wav');
  symlinkSync('in.wav', folder.at('link.wav'));
  symlinkSync(folder.path, folder.at('round'));
  linkSync(folder.at('in.wav'), folder.at('second.wav'));
  for (const out of ['in.wav', './there/../in.wav', 'link.wav', 'round/in.wav', 'second.wav']) {
    const { code, stderr } = await folder.fettle('render', 'a.json', 'in.wav', out);
    expect({ code, stderr }).toEqual({ code: 2, stderr: `${out} is the same file as in.wav, which is only read; expected another name\n` });
  }
  expect(folder.read('in.wav').equals(before)).toBe(true);
});

test.skipIf(!POSIX)('OUT by way of a link is written where the link leads; what is no plain file is refused', async () => {
  const folder = folderWith(100);
  folder.write('there/real.wav', 'an older take');
  symlinkSync('there/real.wav', folder.at('link.wav'));
  expect(await folder.fettle('render', 'a.json', 'in.wav', 'link.wav')).toMatchObject({ code: 0, stderr: '' });
  expect(takeApart(folder.read('there/real.wav')).samples).toHaveLength(100);
  const { code, stderr } = await folder.fettle('render', 'a.json', 'in.wav', '/dev/null');
  expect({ code, stderr }).toEqual({ code: 2, stderr: '/dev/null is not a plain file; expected one or a new name\n' });
});

test.skipIf(!POSIX)('a write that fails on the way is a failure, leaves no part behind and the older file as it was', async () => {
  const folder = folderWith(200_000);
  folder.write('out.wav', 'an older take');
  const limited = `ulimit -f 64; exec "${process.execPath}" "${FETTLE}" render a.json in.wav out.wav`;
  const { code, stderr } = await ended(spawn('sh', ['-c', limited], { cwd: folder.path }));
  expect({ code, stderr }).toEqual({ code: 1, stderr: 'out.wav cannot be written: the file is larger than the system allows\n' });
  expect(folder.names()).toEqual(['a.json', 'in.wav', 'out.wav', 'sound.json', 'there']);
  expect(folder.read('out.wav').toString()).toBe('an older take');
});

test.skipIf(!POSIX).each(['SIGINT', 'SIGTERM'] as const)('%s during the render leaves the folder as it was', async (signal) => {
  const folder = folderWith(48000 * 60, { ...PLAIN, channels: 2 });
  folder.write('out.wav', 'an older take');
  const words = ['render', 'a.json', 'in.wav', 'out.wav', '--set', 'design.oversampling=16'];
  const child = spawn(process.execPath, [FETTLE, ...words], { cwd: folder.path });
  await wait(800);
  child.kill(signal);
  expect(await ended(child)).toMatchObject({ code: null, signal });
  expect(folder.names()).toEqual(['a.json', 'in.wav', 'out.wav', 'sound.json', 'there']);
  expect(folder.read('out.wav').toString()).toBe('an older take');
});

/** Writes 64 MB by the command's own writer, in a process that sends itself a signal as soon as the first piece is on its way. */
function writeAndSend(folder: Folder, signal: string | undefined) {
  const files = pathToFileURL(`${ROOT}/model/command/files.ts`).href;
  const source = `
    const { existsSync, readdirSync } = await import('node:fs');
    const { writeWhole } = await import(${JSON.stringify(files)});
    const writing = writeWhole('out.wav', new Uint8Array(64e6));
    const look = setInterval(() => {
      if (!readdirSync('.').some((name) => name.startsWith('.fettle-'))) return;
      clearInterval(look);
      console.log('a part was there');
      ${signal ? `process.kill(process.pid, '${signal}');` : ''}
    });
    await writing;`;
  const words = ['--import', pathToFileURL(`${ROOT}/node_modules/tsx/dist/loader.mjs`).href, '--input-type=module', '-e', source];
  return ended(spawn(process.execPath, words, { cwd: folder.path }));
}

test.skipIf(!POSIX).each(['SIGINT', 'SIGTERM', 'SIGHUP'])(
  '%s during the write removes the part, and the process dies of it',
  async (signal) => {
    const folder = newFolder();
    expect(await writeAndSend(folder, signal)).toEqual({ code: null, signal, stdout: 'a part was there\n', stderr: '' });
    expect(folder.names()).toEqual([]);
  },
);

test('without a signal the same write ends with the whole file', async () => {
  const folder = newFolder();
  expect(await writeAndSend(folder, undefined)).toEqual({ code: 0, signal: null, stdout: 'a part was there\n', stderr: '' });
  expect(folder.names()).toEqual(['out.wav']);
  expect(folder.read('out.wav')).toHaveLength(64e6);
});
