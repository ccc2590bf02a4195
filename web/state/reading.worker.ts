/** Answers questions about the shadow tone, the moment's reading before everything else. */
import { sentenceOf } from './notes.ts';
import { findWorst, readFeedbackCurve, readMoment } from './toneStudy.ts';
import type { FromReading, ToneQuestion, ToReading } from './workers.ts';

let asked: { id: number; question: ToneQuestion } | null = null;
let work: Generator<void, void> | null = null;
const pump = new MessageChannel();

self.onmessage = ({ data }: MessageEvent<ToReading>) => {
  switch (data.type) {
    case 'question':
      asked = data;
      work = answer(data.id, data.question);
      pump.port2.postMessage(null);
      return;
    case 'moment':
      return answerMoment(data.id, data.gateV);
    default:
      data satisfies never;
      throw new TypeError(`The reading worker does not know the message ${JSON.stringify(data)}`);
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
  if (asked === null) {
    tell({ type: 'reading', id, reading: { fault: 'No design has been given yet.' } });
    return;
  }
  try {
    tell({ type: 'reading', id, reading: readMoment(asked.question, gateV) });
  } catch (error) {
    tell({ type: 'reading', id, reading: { fault: sentenceOf(error) } });
  }
}

function tell(message: FromReading): void {
  self.postMessage(message);
}
