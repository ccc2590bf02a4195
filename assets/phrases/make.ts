/**
 * Makes the demo phrases and their manifest anew: `npx tsx assets/phrases/make.ts`.
 * The same bytes on every run with one version of Node; another engine's sine may move a sample by one step.
 */
import { createHash } from 'node:crypto';
import { writeFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { encodeWav } from './finish.ts';
import { BARS, BEAT_SEC, BEATS_PER_BAR, LOOP_SAMPLES, LOOP_SEC, SAMPLE_RATE_HZ } from './loop.ts';
import { PHRASES } from './phrases.ts';

const folder = fileURLToPath(new URL('.', import.meta.url));

const entries = PHRASES.map(({ name, title, listenFor, channels, render }) => {
  const file = `${name}.wav`;
  const data = encodeWav(render(), channels);
  writeFileSync(folder + file, data);
  console.log(`${file}: ${data.length} bytes`);
  return {
    name,
    title,
    file,
    listenFor,
    channels,
    sampleRateHz: SAMPLE_RATE_HZ,
    lengthSec: LOOP_SEC,
    loopStartSample: 0,
    loopEndSample: LOOP_SAMPLES,
    bars: BARS,
    beatsPerBar: BEATS_PER_BAR,
    beatsPerMinute: 60 / BEAT_SEC,
    bytes: data.length,
    sha256: createHash('sha256').update(data).digest('hex'),
  };
});

const licence = 'Composed and synthesised by the scripts in this folder; no recordings are used. Under the licence of the project.';
writeFileSync(`${folder}manifest.json`, `${JSON.stringify({ licence, phrases: entries }, null, 2)}\n`);
