/** The shadow tone's readings, from a worker: asked for when something changed, and ten times a second while sound moves the gate. */
import type { ReadonlySignal } from '@preact/signals';
import { effect, signal } from '@preact/signals';
import type { Design } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { Bench, FeedbackPoint, GatePeriod, LiveLevels, WorstReading } from './bench.ts';
import { setWithin } from './within.ts';
import type { FromReading, ToReading, WorkerPort } from './workers.ts';

const EVERY_MS = 100;
const FIRST_TONE_V = 0.5;
const FIRST_TONE_HZ = 1000;

type Readings = Pick<Bench, 'reading' | 'period' | 'worst' | 'feedbackCurve' | 'toneV' | 'setToneV' | 'toneHz' | 'setToneHz'>;

export interface ReadingSources {
  readonly design: ReadonlySignal<Design>;
  readonly heardVariant: ReadonlySignal<number>;
  readonly live: ReadonlySignal<LiveLevels | null>;
  readonly playing: ReadonlySignal<boolean>;
}

export function createReadings(worker: WorkerPort<ToReading, FromReading>, sources: ReadingSources): Readings {
  const reading = signal<ToneReading | { readonly fault: string } | null>(null);
  const period = signal<GatePeriod | { readonly fault: string } | null>(null);
  const worst = signal<WorstReading | null>(null);
  const feedbackCurve = signal<readonly FeedbackPoint[] | null>(null);
  const toneV = signal(FIRST_TONE_V);
  const toneHz = signal(FIRST_TONE_HZ);
  let id = 0;
  let waiting = false;
  let askAgain = false;

  const askMoment = () => {
    if (waiting) {
      askAgain = true;
      return;
    }
    waiting = true;
    askAgain = false;
    worker.post({ type: 'moment', id, gateV: sources.playing.peek() ? (sources.live.peek()?.gateSourceV ?? null) : null });
  };

  const receive = (message: FromReading) => {
    switch (message.type) {
      case 'reading':
        waiting = false;
        if (message.id === id) reading.value = message.reading;
        if (askAgain) askMoment();
        return;
      case 'period':
        if (message.id === id) period.value = message.period;
        return;
      case 'worst':
        if (message.id === id) worst.value = message.worst;
        return;
      case 'curve':
        if (message.id === id) feedbackCurve.value = message.points;
        return;
      default:
        message satisfies never;
        throw new TypeError(`The page does not know the worker's reading ${JSON.stringify(message)}`);
    }
  };

  worker.receive(receive, (sentence) => {
    reading.value = { fault: sentence };
  });

  effect(() => {
    const question = { design: sources.design.value, variantIndex: sources.heardVariant.value, toneHz: toneHz.value, toneV: toneV.value };
    id++;
    worker.post({ type: 'question', id, question });
    askMoment();
  });

  effect(() => {
    if (!sources.playing.value) {
      askMoment();
      return undefined;
    }
    const timer = setInterval(askMoment, EVERY_MS);
    return () => clearInterval(timer);
  });

  return {
    reading,
    period,
    worst,
    feedbackCurve,
    toneV,
    toneHz,
    setToneV: (volts) => setWithin(toneV, volts, 0.0001, 100, 'The shadow tone', 'V peak'),
    setToneHz: (hz) => setWithin(toneHz, hz, 1, 20000, 'The shadow tone', 'Hz'),
  };
}
