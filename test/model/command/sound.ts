/**
 * WAV files made and taken apart with Node's Buffer, apart from the project's own reader and writer.
 * Source: Multimedia Programming Interface and Data Specifications 1.0 (1991), from memory.
 */

export interface Kind {
  readonly bits: 16 | 24 | 32;
  readonly float: boolean;
  readonly channels: 1 | 2;
  readonly rateHz: number;
}

/** `samples` interleaved, as they stand in the file: integers for PCM. */
export function wavOf(kind: Kind, samples: readonly number[]): Buffer {
  const width = kind.bits / 8;
  const data = Buffer.alloc(samples.length * width);
  samples.forEach((sample, i) => {
    if (kind.float) data.writeFloatLE(sample, i * width);
    else data.writeIntLE(sample, i * width, width);
  });
  const head = Buffer.alloc(44);
  head.write('RIFF', 0, 'latin1');
  head.writeUInt32LE(36 + data.length, 4);
  head.write('WAVEfmt ', 8, 'latin1');
  head.writeUInt32LE(16, 16);
  head.writeUInt16LE(kind.float ? 3 : 1, 20);
  head.writeUInt16LE(kind.channels, 22);
  head.writeUInt32LE(kind.rateHz, 24);
  head.writeUInt32LE(kind.rateHz * kind.channels * width, 28);
  head.writeUInt16LE(kind.channels * width, 32);
  head.writeUInt16LE(kind.bits, 34);
  head.write('data', 36, 'latin1');
  head.writeUInt32LE(data.length, 40);
  return Buffer.concat([head, data]);
}

/** The same backwards, for files with the plain 44-byte head. */
export function takeApart(file: Buffer): Kind & { samples: number[] } {
  const bits = file.readUInt16LE(34) as Kind['bits'];
  const float = file.readUInt16LE(20) === 3;
  const width = bits / 8;
  const samples = Array.from({ length: file.readUInt32LE(40) / width }, (_, i) =>
    float ? file.readFloatLE(44 + i * width) : file.readIntLE(44 + i * width, width),
  );
  return { bits, float, channels: file.readUInt16LE(22) as Kind['channels'], rateHz: file.readUInt32LE(24), samples };
}

/** A tone and a ramp at half of full scale, different in each channel, interleaved. */
export function soundOf(kind: Kind, frames: number): number[] {
  const full = kind.float ? 1 : 2 ** (kind.bits - 1);
  return Array.from({ length: frames * kind.channels }, (_, i) => {
    const frame = Math.floor(i / kind.channels);
    const value = i % kind.channels === 0 ? 0.5 * Math.sin(frame / 7) : frame / frames - 0.5;
    return kind.float ? Math.fround(value) : Math.round(value * full);
  });
}
