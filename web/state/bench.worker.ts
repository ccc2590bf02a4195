/**
 * The page's work off its own thread. One module, so that the model is fetched once: an instance for readings lives as long as the page, one
 * for each render until it is done.
 */
import { renderClip } from '../../model/chain/render.ts';
import { loudnessOf } from '../../model/measure/loudness.ts';
import { controlPicture } from './controlPicture.ts';
import { sentenceOf } from './notes.ts';
import { readBeyond, readFeedbackCurve, readMoment, readNoise, readPlane, readSummary, readSwing } from './toneStudy.ts';
import type { FromLoudness, FromReading, FromRender, ToLoudness, ToneQuestion, ToReading, ToRender } from './workers.ts';

let asked: { id: number; question: ToneQuestion } | null = null;
type Work = 'curve' | 'swing' | 'noise' | 'variant';
/** What is looked at while values move comes first, the curve before all. */
const ORDER: readonly Work[] = ['curve', 'swing', 'noise', 'variant'];
/** One stretch in so many is for the others first: a curve that is asked for again and again leaves them room. */
const TURN = 4;
const OTHERS_FIRST: readonly Work[] = ['swing', 'noise', 'variant', 'curve'];
let stretches = 0;
/** Of one go. */
const STRETCH_MS = 5;
/** In small steps. */
const work = new Map<Work, Generator<void, void>>();
let pumping = false;
const pump = new MessageChannel();

self.onmessage = ({ data }: MessageEvent<ToReading | ToRender | ToLoudness>) => {
  switch (data.type) {
    case 'question':
      asked = data;
      return;
    case 'moment':
      answerMoment(data.id, data.gateV);
      return;
    case 'curve':
      begin('curve', answerCurve(data.id, questionNow(), data.gateV));
      return;
    case 'swing':
      work.delete('noise');
      begin('swing', answerSwing(data.id, questionNow()));
      return;
    case 'variant':
      begin('variant', answerVariant(data.id, { ...questionNow(), variantIndex: data.index }));
      return;
    case 'render':
      render(data);
      return;
    case 'loudness':
      answerLoudness(data);
      return;
    default:
      data satisfies never;
      throw new TypeError(`The page's worker does not know the message ${JSON.stringify(data)}`);
  }
};

function questionNow(): ToneQuestion {
  if (asked === null) throw new Error('No design has been given yet.');
  return asked.question;
}

function begin(name: Work, steps: Generator<void, void>): void {
  work.set(name, steps);
  if (pumping) return;
  pumping = true;
  pump.port2.postMessage(null);
}

function step(order: readonly Work[]): void {
  const name = order.find((each) => work.has(each));
  const steps = name && work.get(name);
  if (name && steps?.next().done && work.get(name) === steps) work.delete(name);
}

/** A stretch of the work, then back to the queue, so that a moment never waits for long. */
pump.port1.onmessage = () => {
  const end = performance.now() + STRETCH_MS;
  stretches += 1;
  const order = stretches % TURN === 0 ? OTHERS_FIRST : ORDER;
  do step(order);
  while (work.size > 0 && performance.now() < end);
  pumping = work.size > 0;
  if (pumping) pump.port2.postMessage(null);
};

/** The moment's reading carries the sentence of what cannot be read; a curve or a swing only says that there is nothing to draw. */
function* orNull<T>(steps: Generator<void, T>): Generator<void, T | null> {
  try {
    return yield* steps;
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

function* answerCurve(id: number, question: ToneQuestion, gateV: number | null): Generator<void, void> {
  tell({ type: 'curve', id, curve: yield* orNull(readFeedbackCurve(question, gateV)) });
}

function* answerSwing(id: number, question: ToneQuestion): Generator<void, void> {
  tell({ type: 'period', id, period: controlPicture(question.design, question.variantIndex, question.toneHz) });
  yield;
  tell({ type: 'plane', id, plane: yield* orNull(planeOf(question)) });
  tell({ type: 'worst', id, swing: yield* orNull(readSwing(question)) });
  tell({ type: 'beyond', id, points: yield* orNull(readBeyond(question)) });
  begin('noise', answerNoise(id, question));
}

// biome-ignore lint/correctness/useYield: one step among others that take several
function* planeOf(question: ToneQuestion) {
  return readPlane(question);
}

function* answerNoise(id: number, question: ToneQuestion): Generator<void, void> {
  tell({ type: 'noise', id, points: yield* orNull(readNoise(question)) });
}

function* answerVariant(id: number, question: ToneQuestion): Generator<void, void> {
  tell({ type: 'variant', id, index: question.variantIndex, summary: yield* orNull(readSummary(question)) });
}

function answerMoment(id: number, gateV: number | null): void {
  try {
    tell({ type: 'reading', id, ...readMoment(questionNow(), gateV) });
  } catch (error) {
    tell({ type: 'reading', id, reading: { fault: sentenceOf(error) }, thdBand: null, path: null });
  }
}

function render({ design, variantIndex, channels, sampleRateHz }: ToRender): void {
  try {
    const onProgress = (fraction: number) => tell({ type: 'progress', fraction });
    const lines = renderClip(design, variantIndex, channels, sampleRateHz, { onProgress }) as Float32Array<ArrayBuffer>[];
    const buffers = lines.map((line) => line.buffer);
    tell({ type: 'done', channels: lines }, buffers);
  } catch (error) {
    tell({ type: 'fault', sentence: sentenceOf(error) });
  }
}

function answerLoudness({ about, channels, sampleRateHz }: ToLoudness): void {
  try {
    const lines = about === null ? channels : renderClip(about.design, about.index, channels, sampleRateHz);
    tell({ type: 'loudness', lufs: loudnessOf(lines, sampleRateHz) });
  } catch (error) {
    tell({ type: 'fault', sentence: sentenceOf(error) });
  }
}

function tell(message: FromReading | FromRender | FromLoudness, transfer: Transferable[] = []): void {
  self.postMessage(message, { transfer });
}
