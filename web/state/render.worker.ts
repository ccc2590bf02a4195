/** Renders one clip, off the audio thread and off the page's; the page ends the worker when it is done with it. */
import { renderClip } from '../../model/chain/render.ts';
import { sentenceOf } from './notes.ts';
import type { FromRender, ToRender } from './workers.ts';

self.onmessage = ({ data }: MessageEvent<ToRender>) => {
  const { design, variantIndex, channels, sampleRateHz } = data;
  const tell = (message: FromRender, transfer: Transferable[] = []) => self.postMessage(message, { transfer });
  try {
    const rendered = renderClip(design, variantIndex, channels, sampleRateHz, (fraction) => tell({ type: 'progress', fraction }));
    const lines = rendered as Float32Array<ArrayBuffer>[];
    tell(
      { type: 'done', channels: lines },
      lines.map((line) => line.buffer),
    );
  } catch (error) {
    tell({ type: 'fault', sentence: sentenceOf(error) });
  }
};
