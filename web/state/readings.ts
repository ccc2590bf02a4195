/** The shadow tone's readings, from a worker: asked for when something changed, and at the gate of the moment while sound moves it. */
import type { ReadonlySignal } from '@preact/signals';
import { batch, effect, signal } from '@preact/signals';
import type { Moves } from '../../model/design/feedback.ts';
import type { Design } from '../../model/design/types.ts';
import type {
  Bench,
  ControlPicture,
  FeedbackCurve,
  LiveLevels,
  Moment,
  NoisePoint,
  SwingPoint,
  TransferPlane,
  WorstReading,
} from './bench.ts';
import { createCurves } from './curves.ts';
import { createSummaries } from './summaries.ts';
import { setWithin } from './within.ts';
import type { FromReading, ToReading, WorkerPort } from './workers.ts';

/** Reports come about 33 ms apart: every second one is read. */
const MOMENT_MS = 60;
/** Between a curve and the next, so that the worker is free half of the time. */
const CURVE_REST_MS = 60;
const FIRST_TONE_V = 0.5;
const FIRST_TONE_HZ = 1000;

type Measured = 'moment' | 'period' | 'worst' | 'swing' | 'beyond' | 'plane' | 'noise' | 'summaries' | 'feedbackCurve';
type Readings = Pick<Bench, Measured | 'toneV' | 'setToneV' | 'toneHz' | 'setToneHz'>;

export interface ReadingSources {
  readonly design: ReadonlySignal<Design>;
  readonly heardVariant: ReadonlySignal<number>;
  readonly moves: ReadonlySignal<Moves>;
  readonly live: ReadonlySignal<LiveLevels | null>;
  readonly playing: ReadonlySignal<boolean>;
}

export function createReadings(
  worker: WorkerPort<ToReading, FromReading>,
  sources: ReadingSources,
  now: () => number = () => performance.now(),
): Readings {
  const moment = signal<Moment | null>(null);
  const period = signal<ControlPicture | { readonly fault: string } | null>(null);
  /** What the questions are about, and the first of them that is about that. */
  let askedAbout = '';
  let aboutFromId = 0;
  const worst = signal<WorstReading | null>(null);
  const swing = signal<readonly SwingPoint[] | null>(null);
  const beyond = signal<readonly SwingPoint[] | null>(null);
  const plane = signal<TransferPlane | null>(null);
  const noise = signal<readonly NoisePoint[] | null>(null);
  const feedbackCurve = signal<FeedbackCurve | null>(null);
  const toneV = signal(FIRST_TONE_V);
  const toneHz = signal(FIRST_TONE_HZ);
  let id = 0;
  let failed: string | null = null;
  let asked: LiveLevels | null = null;
  let curveEndMs = Number.NEGATIVE_INFINITY;

  const momentTurn = createTurn(() => {
    asked = sources.playing.peek() ? sources.live.peek() : null;
    if (failed === null) worker.post({ type: 'moment', id, gateV: asked?.gateSourceV ?? null });
    else publish(unread(failed));
  }, now);
  const curves = createCurves();
  const curveTurn = createTurn(() => {
    const levels = sources.playing.peek() ? moment.peek()?.levels : null;
    worker.post({ type: 'curve', id, gateV: levels ? curves.nearV(levels.gateSourceV) : null });
  }, now);
  const summaries = createSummaries((index) => worker.post({ type: 'variant', id, index }));
  const swingTurn = createTurn(() => worker.post({ type: 'swing', id }), now);

  const publish = (read: Omit<Moment, 'levels'>) => {
    const known = asked && curves.at(asked.gateSourceV);
    batch(() => {
      moment.value = { levels: asked, ...read };
      if (known) feedbackCurve.value = known;
    });
    momentTurn.done();
    if (asked !== null && !known && !curveTurn.taken() && now() - curveEndMs >= CURVE_REST_MS) curveTurn.ask();
  };

  const receive = (message: FromReading) => {
    switch (message.type) {
      case 'reading':
        if (message.id === id) {
          const { reading, thdBand, path } = message;
          return publish({ reading, thdBand, path });
        }
        return momentTurn.done(true);
      case 'curve':
        if (message.id === id && message.curve) curves.keep(message.curve);
        // The moment's own curve may be there by now: then this one would be a step back.
        if (!asked || !curves.at(asked.gateSourceV)) feedbackCurve.value = message.curve;
        curveEndMs = now();
        return curveTurn.done();
      case 'period':
        period.value = message.period;
        return;
      case 'worst':
        if (message.id >= aboutFromId) {
          worst.value = message.swing?.worst ?? null;
          swing.value = message.swing?.points ?? null;
        }
        return swingTurn.done();
      case 'plane':
        plane.value = message.plane;
        return;
      case 'beyond':
        if (message.id === id) beyond.value = message.points;
        return;
      case 'variant':
        return summaries.note(message.index, message.summary);
      case 'noise':
        if (message.id === id) noise.value = message.points;
        return;
      default:
        message satisfies never;
        throw new TypeError(`The page does not know the worker's reading ${JSON.stringify(message)}`);
    }
  };

  worker.receive(receive, (sentence) => {
    failed = sentence;
    publish(unread(sentence));
  });

  effect(() => {
    const question = {
      design: sources.design.value,
      variantIndex: sources.heardVariant.value,
      moves: sources.moves.value,
      toneHz: toneHz.value,
      toneV: toneV.value,
    };
    id++;
    noise.value = null;
    beyond.value = null;
    // A value that moves keeps the ranges in sight until the new ones are there; those of another variant say nothing of this one.
    const about = `${question.design.title} ${question.variantIndex}`;
    if (about !== askedAbout) {
      aboutFromId = id;
      worst.value = null;
      swing.value = null;
    }
    askedAbout = about;
    curves.clear();
    worker.post({ type: 'question', id, question });
    momentTurn.ask();
    curveTurn.ask();
    swingTurn.ask();
    summaries.ask(question);
  });

  effect(() => {
    if (sources.playing.value) return;
    momentTurn.ask();
    curveTurn.ask();
  });
  sources.live.subscribe((live) => {
    if (live !== null && sources.playing.peek() && !momentTurn.taken() && now() - momentTurn.askedMs() >= MOMENT_MS) momentTurn.ask();
  });

  return {
    moment,
    period,
    worst,
    swing,
    beyond,
    plane,
    noise,
    summaries: summaries.all,
    feedbackCurve,
    toneV,
    toneHz,
    setToneV: (volts) => setWithin(toneV, volts, 0.0001, 100, 'The shadow tone', 'V peak'),
    setToneHz: (hz) => setWithin(toneHz, hz, 1, 20000, 'The shadow tone', 'Hz'),
  };
}

function unread(fault: string): Omit<Moment, 'levels'> {
  return { reading: { fault }, thdBand: null, path: null };
}

/** One request at a time: what is asked for meanwhile is asked once more when the answer has come. */
function createTurn(post: () => void, now: () => number) {
  let waiting = false;
  let again = false;
  let askedMs = Number.NEGATIVE_INFINITY;
  const ask = () => {
    again = waiting;
    if (waiting) return;
    waiting = true;
    askedMs = now();
    post();
  };
  return {
    ask,
    taken: () => waiting,
    askedMs: () => askedMs,
    /** The answer is here; `anew` asks again at once. */
    done(anew = false) {
      waiting = false;
      if (!again && !anew) return;
      again = false;
      ask();
    },
  };
}
