/** The worklet in an offline context, in reach of a test. Built with the page's settings and served by a test, never shipped. */
import { compileChain } from '../../../model/chain/compile.ts';
import type { Design } from '../../../model/design/types.ts';
import workletUrl from '../../../worklet/fettle.worklet.ts?worker&url';
import type { MatchDb } from '../../../web/state/bench.ts';
import { createBench } from '../../../web/state/createBench.ts';
import type { CellOptions, FromCell } from '../../../worklet/protocol.ts';
import { CELL_PROCESSOR } from '../../../worklet/protocol.ts';
import { renderNamed, sha256 } from '../../support/sameRenders.ts';
import { feedMalformed } from './feedMalformed.ts';
import RenderWorker from './render.worker.ts?worker';

declare global {
  interface Window {
    /** The gains to one loudness that the page's bench measures for a design, as JSON, and a sound file, as base64. */
    matchOf(design: string, file: string): Promise<MatchDb>;
    /** Opens the malformed files of these seeds, one after the other, as the page's own door does. */
    feedMalformed: typeof feedMalformed;
    /** SHA-256 of one of the named renders, made on the page's own thread or in a worker. */
    hashOf(name: string, where: 'page' | 'worker'): Promise<string>;
    /** The samples that leave the cell's processor, as the bytes of Float32 in base64, one text for each channel. */
    playOffline(design: Design, rateHz: number, channels: readonly string[]): Promise<string[]>;
  }
}

window.feedMalformed = feedMalformed;

window.playOffline = async (design, rateHz, channels) => {
  const lines = channels.map(toSamples);
  const length = lines[0].length;
  const context = new OfflineAudioContext(lines.length, length, rateHz);
  await context.audioWorklet.addModule(workletUrl);
  const numbers = compileChain(design, 0, rateHz, lines.length, 'lowLatency');
  const processorOptions: CellOptions = {
    ...{ chains: [numbers], focus: 0, channels: lines.length, heard: 'cell', match: { slots: [1, 1, 1, 1, 1], bypass: 1 } },
    ...{ residual: { part: null, gain: 1 }, gain: 1, ceilingPeak: 1, muted: false },
  };
  const node = new AudioWorkletNode(context, CELL_PROCESSOR, {
    numberOfInputs: 2,
    outputChannelCount: [lines.length],
    channelCount: lines.length,
    channelCountMode: 'explicit',
    processorOptions,
  });
  await new Promise<void>((resolve) => {
    node.port.onmessage = ({ data }: MessageEvent<FromCell>) => {
      if (data.type === 'ready') resolve();
    };
  });
  const buffer = new AudioBuffer({ length, numberOfChannels: lines.length, sampleRate: rateHz });
  lines.forEach((line, c) => {
    buffer.copyToChannel(line, c);
  });
  const source = new AudioBufferSourceNode(context, { buffer });
  source.connect(node).connect(context.destination);
  source.start();
  const rendered = await context.startRendering();
  return lines.map((_, c) => toText(rendered.getChannelData(c)));
};

window.matchOf = async (design, file) => {
  const bench = createBench();
  await bench.openDesign(new File([design], 'design.json'));
  const bytes = Uint8Array.from(atob(file), (letter) => letter.charCodeAt(0));
  await bench.openAudio(new File([bytes], 'sound.wav'));
  bench.setMatched(true);
  return new Promise((resolve) => {
    const stop = bench.matchDb.subscribe((match) => {
      if (match.variants.includes(null)) return;
      resolve(match);
      queueMicrotask(() => stop());
    });
  });
};

window.hashOf = async (name, where) => {
  if (where === 'page') return sha256(renderNamed(name));
  const worker = new RenderWorker();
  return new Promise((resolve, reject) => {
    worker.onmessage = ({ data }: MessageEvent<string>) => resolve(data);
    worker.onerror = (event) => reject(new Error(event.message));
    worker.postMessage(name);
  });
};

function toSamples(text: string): Float32Array<ArrayBuffer> {
  return new Float32Array(Uint8Array.from(atob(text), (letter) => letter.charCodeAt(0)).buffer);
}

function toText(samples: Float32Array): string {
  const bytes = new Uint8Array(samples.buffer, samples.byteOffset, samples.byteLength);
  let text = '';
  for (const byte of bytes) text += String.fromCharCode(byte);
  return btoa(text);
}
