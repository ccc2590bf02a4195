import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { brotliDecompressSync } from 'node:zlib';
import { expect, test } from 'vitest';

const folder = fileURLToPath(new URL('../../assets/fonts/', import.meta.url));
const manifest: { family: string; fonts: { file: string; style: string; bytes: number; sha256: string }[] } = JSON.parse(
  readFileSync(`${folder}manifest.json`, 'utf8'),
);
const files = manifest.fonts.map((font) => ({ ...font, data: readFileSync(folder + font.file) }));

/** What the page may write without a foreign face: the words and values of a data sheet in western Latin. */
const NEEDED = [range(0x20, 0x7e), range(0xa0, 0xff), 'ΩΔμφλπ–—‘’“”…\u2009−×±·½↑↓√°µ₀₁₂₃₄₅₆₇₈₉'].join('');

test('the fonts are the ones of the manifest and weigh less than 120 000 bytes together', () => {
  for (const font of files) {
    expect(font.data.length, font.file).toBe(font.bytes);
    expect(createHash('sha256').update(font.data).digest('hex'), font.file).toBe(font.sha256);
  }
  expect(files.reduce((sum, font) => sum + font.data.length, 0)).toBeLessThan(120_000);
  expect(files.map((font) => font.style)).toEqual(['normal', 'italic']);
});

test.each(files)('$file has every character the page may write, so that none falls to a foreign face', ({ data }) => {
  const has = readCharacters(readTables(data).get('cmap') as Buffer);
  expect([...NEEDED].filter((character) => !has(character.codePointAt(0) as number))).toEqual([]);
  expect(has('Ж'.charCodeAt(0))).toBe(false);
});

test.each(files)('$file varies in weight from 400 to 650 and in optical size from 8 to 40', ({ data }) => {
  expect(readAxes(readTables(data).get('fvar') as Buffer)).toEqual({ wght: [400, 400, 650], opsz: [8, 20, 40] });
});

test('the licence travels with the fonts and its reserved name is not used for them', () => {
  const licence = readFileSync(`${folder}OFL.txt`, 'utf8');
  expect(licence).toContain('SIL OPEN FONT LICENSE Version 1.1');
  expect(licence).toContain('Reserved Font Name ‘Source’');
  for (const font of files) {
    const names = (readTables(font.data).get('name') as Buffer).swap16().toString('utf16le');
    expect(names).toContain(manifest.family);
    expect(names).not.toContain('Source Serif');
  }
});

function range(first: number, last: number): string {
  return Array.from({ length: last - first + 1 }, (_, index) => String.fromCharCode(first + index)).join('');
}

/** The tables of a WOFF2 file that are stored as they are. Source: W3C, WOFF File Format 2.0, sections 4 and 5 (order of known tags from there). */
function readTables(data: Buffer): Map<string, Buffer> {
  const KNOWN =
    'cmap head hhea hmtx maxp name OS/2 post cvt  fpgm glyf loca prep CFF  VORG EBDT EBLC gasp hdmx kern LTSH PCLT VDMX vhea vmtx BASE GDEF GPOS GSUB EBSC JSTF MATH CBDT CBLC COLR CPAL SVG  sbix acnt avar bdat bloc bsln cvar fdsc feat fmtx fvar gvar hsty just lcar mort morx opbd prop trak Zapf Silf Glat Gloc Feat Sill';
  let at = 48;
  const number = () => {
    let value = 0;
    for (let byte = 0x80; byte & 0x80; ) {
      byte = data[at++];
      value = value * 128 + (byte & 0x7f);
    }
    return value;
  };
  const entries = Array.from({ length: data.readUInt16BE(12) }, () => {
    const flags = data[at++];
    const known = flags & 0x3f;
    const tag = known < 63 ? KNOWN.slice(known * 5, known * 5 + 4) : data.toString('latin1', at, at + 4);
    if (known === 63) at += 4;
    const length = number();
    const outline = tag === 'glyf' || tag === 'loca';
    const transformed = outline ? flags >> 6 === 0 : flags >> 6 !== 0;
    return { tag, length: transformed ? number() : length };
  });
  const body = brotliDecompressSync(data.subarray(at, at + data.readUInt32BE(20)));
  const tables = new Map<string, Buffer>();
  let offset = 0;
  for (const { tag, length } of entries) {
    tables.set(tag, body.subarray(offset, offset + length));
    offset += length;
  }
  return tables;
}

/** Whether a code point has a glyph. Source: ISO/IEC 14496-22 (Open Font Format), cmap subtable format 4; a gap segment maps to no glyph. */
function readCharacters(cmap: Buffer): (codePoint: number) => boolean {
  const records = Array.from({ length: cmap.readUInt16BE(2) }, (_, index) => cmap.readUInt32BE(4 + index * 8 + 4));
  const table = cmap.subarray(records.find((offset) => cmap.readUInt16BE(offset) === 4));
  const count = table.readUInt16BE(6) / 2;
  return (codePoint) => {
    for (let index = 0; index < count; index++) {
      if (codePoint > table.readUInt16BE(14 + index * 2)) continue;
      return codePoint >= table.readUInt16BE(16 + (count + index) * 2);
    }
    return false;
  };
}

/** Minimum, default and maximum of each axis. Source: ISO/IEC 14496-22, fvar. */
function readAxes(fvar: Buffer): Record<string, number[]> {
  const start = fvar.readUInt16BE(4);
  const fixed = (at: number) => fvar.readInt32BE(at) / 65536;
  return Object.fromEntries(
    Array.from({ length: fvar.readUInt16BE(8) }, (_, index) => {
      const at = start + index * 20;
      return [fvar.toString('latin1', at, at + 4), [fixed(at + 4), fixed(at + 8), fixed(at + 12)]];
    }),
  );
}
