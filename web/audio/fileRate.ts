/**
 * The sample rate that a sound file states in its header, Hz, so that it can be decoded without being resampled; null where it is not found.
 *
 * Source   RIFF WAVE; RFC 9639 (FLAC stream information); RFC 3533 with RFC 7845 (Ogg, Opus) and the Vorbis I identification header;
 *          ISO/IEC 11172-3 and 13818-3 (frame header of layers I to III); ISO/IEC 14496-12 (audio sample entry). From memory
 */
export function readFileRate(bytes: Uint8Array): number | null {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const tag = (at: number, length = 4) => String.fromCharCode(...bytes.subarray(at, at + length));
  if (bytes.length < 64) return null;
  if (tag(0) === 'RIFF' && tag(8) === 'WAVE') return waveRate(bytes, view, tag);
  if (tag(0) === 'fLaC') return (bytes[18] << 12) | (bytes[19] << 4) | (bytes[20] >> 4);
  if (tag(0) === 'OggS') return oggRate(view, tag);
  if (tag(4) === 'ftyp') return mp4Rate(bytes, view, tag);
  return mpegRate(bytes, tag);
}

type Tag = (at: number, length?: number) => string;

export function isWave(bytes: Uint8Array): boolean {
  return bytes.length >= 12 && String.fromCharCode(...bytes.subarray(0, 4), ...bytes.subarray(8, 12)) === 'RIFFWAVE';
}

function waveRate(bytes: Uint8Array, view: DataView, tag: Tag): number | null {
  for (let at = 12; at + 16 <= bytes.length; ) {
    const size = view.getUint32(at + 4, true);
    if (tag(at) === 'fmt ') return view.getUint32(at + 12, true);
    at += 8 + size + (size & 1);
  }
  return null;
}

function oggRate(view: DataView, tag: Tag): number | null {
  if (tag(28, 8) === 'OpusHead') return 48000;
  return tag(29, 6) === 'vorbis' ? view.getUint32(40, true) : null;
}

/** The first `mp4a` sample entry: its rate is 16.16 fixed point, 28 bytes after the tag. */
function mp4Rate(bytes: Uint8Array, view: DataView, tag: Tag): number | null {
  for (let at = 8; at + 32 <= bytes.length; at++) {
    if (bytes[at] === 0x6d && tag(at) === 'mp4a') return view.getUint32(at + 28) >>> 16 || null;
  }
  return null;
}

const MPEG1_RATES = [44100, 48000, 32000];

function mpegRate(bytes: Uint8Array, tag: Tag): number | null {
  let at = 0;
  if (tag(0, 3) === 'ID3') at = 10 + ((bytes[6] << 21) | (bytes[7] << 14) | (bytes[8] << 7) | bytes[9]);
  for (const end = Math.min(bytes.length - 4, at + 4096); at < end; at++) {
    if (bytes[at] !== 0xff || (bytes[at + 1] & 0xe0) !== 0xe0) continue;
    const version = (bytes[at + 1] >> 3) & 3;
    const layer = (bytes[at + 1] >> 1) & 3;
    const index = (bytes[at + 2] >> 2) & 3;
    if (version === 1 || layer === 0 || index === 3) continue;
    return MPEG1_RATES[index] / (version === 3 ? 1 : version === 2 ? 2 : 4);
  }
  return null;
}
