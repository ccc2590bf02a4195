/**
 * The page's work off its own thread. One module, so that the model is fetched once: an instance for readings lives as long as the page, one
 * for each render until it is done.
 */
import { renderClip } from '../../model/chain/render.ts';
import { gatePeriod } from './gatePeriod.ts';
import { sentenceOf } from './notes.ts';
import { findWorst, readFeedbackCurve, readMoment } from './toneStudy.ts';
import type { FromReading, FromRender, ToneQuestion, ToReading, ToRender } from './workers.ts';

let asked: { id: number; question: ToneQuestion } | null = null;
let work: Generator<void, void> | null = null;
const pump = new MessageChannel();

self.onmessage = ({ data }: MessageEvent<ToReading | ToRender>) => {
  switch (data.type) {
    case 'question':
      asked = data;
      work = answer(data.id, data.question);
      pump.port2.postMessage(null);
      return;
    case 'moment':
      answerMoment(data.id, data.gateV);
      return;
    case 'render':
      render(data);
      return;
    default:
      data satisfies never;
      throw new TypeError(`The page's worker does not know the message ${JSON.stringify(data)}`);
  }
};

/** One step of the work, then back to the queue, so that a moment or a newer question never waits for more than one reading. */
pump.port1.onmessage = () => {
  if (work === null) return;
  if (work.next().done) work = null;
  else pump.port2.postMessage(null);
};

function* answer(id: number, question: ToneQuestion): Generator<void, void> {
  yield;
  try {
    tell({ type: 'period', id, period: gatePeriod(question.design, question.variantIndex) });
    yield;
    tell({ type: 'worst', id, worst: yield* findWorst(question) });
    tell({ type: 'curve', id, points: yield* readFeedbackCurve(question) });
  } catch (error) {
    // The moment's reading carries the sentence; here it only says that there is nothing to draw.
    if (!(error instanceof RangeError)) throw error;
    tell({ type: 'worst', id, worst: null });
    tell({ type: 'curve', id, points: null });
  }
}

function answerMoment(id: number, gateV: number | null): void {
  try {
    if (asked === null) throw new RangeError('No design has been given yet.');
    tell({ type: 'reading', id, reading: readMoment(asked.question, gateV) });
  } catch (error) {
    tell({ type: 'reading', id, reading: { fault: sentenceOf(error) } });
  }
}

function render({ design, variantIndex, channels, sampleRateHz }: ToRender): void {
  try {
    const onProgress = (fraction: number) => tell({ type: 'progress', fraction });
    const lines = renderClip(design, variantIndex, channels, sampleRateHz, onProgress) as Float32Array<ArrayBuffer>[];
    const buffers = lines.map((line) => line.buffer);
    tell({ type: 'done', channels: lines }, buffers);
  } catch (error) {
    tell({ type: 'fault', sentence: sentenceOf(error) });
  }
}

function tell(message: FromReading | FromRender, transfer: Transferable[] = []): void {
  self.postMessage(message, { transfer });
}
