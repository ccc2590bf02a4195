/** The sound's life: opened at the source's rate, fitted to another source, mended when its processor fails, closed. */
import type { CellOptions, FromCell, ToCell } from '../../worklet/protocol.ts';
import type { OpenSound, Sound } from '../audio/sound.ts';
import type { Feed, SourceForm } from '../audio/source.ts';

const MOST_REBUILDS = 3;
const REBUILD_WINDOW_MS = 10_000;

export interface LineEvents {
  /** The options for a processor made now; throws a RangeError with a sentence where the design cannot sound at that rate. */
  cellFor(sampleRateHz: number, channels: number): CellOptions;
  message(message: FromCell): void;
  /** The processor is new and silent: nothing is recorded or played aside, and it waits for the latest numbers and to be unmuted. */
  renewed(): void;
  /** The processor failed; it is being made anew, or after three times in ten seconds given up and closed. */
  broken(givenUp: boolean): void;
  /** Making it anew failed too. */
  failed(error: unknown): void;
  paused(on: boolean): void;
  outputLost(): void;
  takeEnded(): void;
}

export interface SoundLine {
  /** Null while no sound is open. */
  sound(): Sound | null;
  /** Channels of the processor that is open. */
  channels(): number | null;
  /** Opens sound for a source, or fits what is open to it, and feeds it. Rejects with a sentence. */
  adapt(form: SourceForm, feed: () => Feed): Promise<void>;
  send(message: ToCell, transfer?: Transferable[]): boolean;
  close(): Promise<void>;
}

export function createSoundLine(openSound: OpenSound, events: LineEvents, now: () => number = () => performance.now()): SoundLine {
  let sound: Sound | null = null;
  let fitted: SourceForm | null = null;
  let rebuilds: number[] = [];
  let turn: Promise<unknown> = Promise.resolve();

  /** One at a time, in order, whether the one before succeeded or not. */
  const inTurn = <T>(work: () => Promise<T>): Promise<T> => {
    const next = turn.then(work, work);
    turn = next;
    return next;
  };

  const close = async () => {
    const closing = sound;
    sound = null;
    fitted = null;
    await closing?.close();
  };

  const rebuild = async (form: SourceForm) => {
    if (sound === null) return;
    await sound.rebuild(events.cellFor(sound.sampleRateHz, form.channels));
    fitted = form;
    events.renewed();
  };

  const mend = () => {
    const at = now();
    rebuilds = [...rebuilds.filter((each) => at - each < REBUILD_WINDOW_MS), at];
    const givenUp = rebuilds.length > MOST_REBUILDS;
    events.broken(givenUp);
    inTurn(() => (givenUp || fitted === null ? close() : rebuild(fitted))).catch(events.failed);
  };

  const adapt = async (form: SourceForm, feed: () => Feed) => {
    const fits = fitted?.sampleRateHz === form.sampleRateHz && fitted.latency === form.latency;
    if (sound !== null && !fits) await close();
    if (sound === null) {
      sound = await openSound(form, (openedHz) => events.cellFor(openedHz, form.channels), { ...events, broken: mend });
      fitted = form;
      events.renewed();
    } else if (fitted?.channels !== form.channels) {
      await rebuild(form);
    }
    sound.feed(feed());
  };

  return {
    sound: () => sound,
    channels: () => fitted?.channels ?? null,
    adapt: (form, feed) => inTurn(() => adapt(form, feed)),
    send(message, transfer) {
      sound?.send(message, transfer);
      return sound !== null;
    },
    close: () => inTurn(close),
  };
}
