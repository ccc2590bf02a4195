/** Sound as the user knows it: start and stop, what is heard, how loud, from which source. */
import { computed, signal } from '@preact/signals';
import { compileChain } from '../../model/chain/compile.ts';
import type { ToCell } from '../../worklet/protocol.ts';
import { MUTE_SEC } from '../../worklet/protocol.ts';
import type { Source } from '../audio/source.ts';
import { formOf } from '../audio/source.ts';
import type { Bench, SoundState } from './bench.ts';
import { createChains } from './chains.ts';
import type { DocumentState } from './document.ts';
import { createHearing } from './hearing.ts';
import type { Levels } from './levels.ts';
import { createLoudness } from './loudness.ts';
import { createMatching } from './matching.ts';
import { watchMoves } from './moves.ts';
import type { Notes } from './notes.ts';
import { sentenceOf } from './notes.ts';
import type { Parts } from './parts.ts';
import { watchPrevious } from './previous.ts';
import { createReceiver } from './receiving.ts';
import { createResidualState } from './residual.ts';
import { createSoundLine } from './soundLine.ts';
import { createSourceState } from './sourceState.ts';
import { watchStall } from './stall.ts';
import type { Takes, TakeSource } from './takes.ts';

/** Twice the ramp, since the message takes its time as well; then the context may rest. */
const MUTED_AFTER_MS = 2000 * MUTE_SEC;
const RATE_BEFORE_START_HZ = 48000;

type Shared =
  | 'sound'
  | 'start'
  | 'stop'
  | 'muted'
  | 'setMuted'
  | 'hearing'
  | 'hear'
  | 'previous'
  | 'residualPart'
  | 'setResidualPart'
  | 'residualGainDb'
  | 'setResidualGainDb'
  | 'matched'
  | 'setMatched'
  | 'matchDb'
  | 'source'
  | 'input'
  | 'region'
  | 'setRegion'
  | 'seek'
  | 'positionSec'
  | 'sourceSamples'
  | 'rateHz'
  | 'latencySec'
  | 'outputLatencySec'
  | 'spectrumRateHz';
type Level = 'listenDb' | 'setListenDb' | 'ceilingDbfs' | 'setCeilingDbfs';

export interface Listening extends Pick<Bench, Shared | Level> {
  /**
   * Puts another source in place of the one there is; sound that plays goes on, but live input begins muted. Rejects, and changes nothing, where it
   * cannot be played.
   */
  setSource(source: Source): Promise<void>;
  /** What takes need of it. */
  readonly forTakes: TakeSource;
}

export interface ListeningNeeds {
  readonly parts: Parts;
  readonly document: DocumentState;
  readonly levels: Levels;
  readonly notes: Notes;
  /** Takes stand on listening and are made after it. */
  takes(): Takes;
  /** Loads a source when Start is pressed before one is there. */
  loadFirstSource(): Promise<void>;
}

export function createListening({ parts, document, levels, notes, takes, loadFirstSource }: ListeningNeeds): Listening {
  const state = signal<SoundState>('idle');
  const muted = signal(false);
  const rateHz = signal<number | null>(null);
  const latencySec = signal<number | null>(null);
  const outputLatencySec = signal<number | null>(null);
  let pausedBySystem = false;

  const send = (message: ToCell) => line.send(message);
  const before = watchPrevious(document);
  const hearing = createHearing(document, before, send, () => {
    update();
    residual.tell();
  });
  const residual = createResidualState(hearing.hearing, send, () => update());
  const chains = createChains({ document, notes, previous: hearing.wantedPrevious, wantsNoise: residual.wantsNoise, send });
  const matching = createMatching({
    ...{ document, previous: before, notes, slots: chains.slots, send, clip: () => source.clip() },
    openWorker: parts.openLoudnessWorker,
  });
  const loudness = createLoudness(send);

  const line = createSoundLine(parts.openSound, {
    cellFor(hz, channels) {
      rateHz.value = hz;
      const what = chains.options(hz, channels);
      const { heard } = hearing;
      return {
        ...what,
        channels,
        heard: heard(),
        match: matching.match(),
        residual: residual.choice(),
        ...loudness.options(),
        muted: true,
      };
    },
    message: (message) => receive(message),
    renewed() {
      chains.renewed();
      update();
      // What was chosen while it was being made has reached no one.
      send({ type: 'hear', heard: hearing.heard() });
      send({ type: 'match', match: matching.match() });
      residual.tell();
      loudness.tell();
      takes().cutShort();
      takes().noteEnded();
      levels.clear();
      if (state.peek() === 'playing') line.send({ type: 'mute', on: muted.peek() });
      // Stop was pressed while it was made anew.
      if (state.peek() === 'stopped') suspend();
    },
    broken(givenUp) {
      if (!givenUp) return notes.fault('The audio processor failed and was started again.');
      state.value = 'failed';
      takes().cutShort();
      notes.fault(
        'The audio processor failed four times in ten seconds; sound was stopped.',
        'Take back the last change, then press Start.',
      );
    },
    failed: (error) => fail(error),
    outputLost() {
      stop();
      notes.fault('The sound output is gone; sound was stopped.', 'Plug the device in or choose another in the system, then press Start.');
    },
    paused(on) {
      if (on && state.peek() === 'playing') {
        pausedBySystem = true;
        state.value = 'stopped';
        notes.add('note', 'The system has paused the sound.', 'Press Start to go on.');
      } else if (!on && pausedBySystem) {
        pausedBySystem = false;
        state.value = 'playing';
      }
    },
    takeEnded: () => endTakeHeard(),
  });

  const source = createSourceState(() => line.sound());

  const fail = (error: unknown) => {
    state.value = 'failed';
    notes.fault(sentenceOf(error));
  };

  const endTakeHeard = () => {
    hearing.setAside(null);
    takes().noteEnded();
  };

  const receive = createReceiver({
    levels,
    notes,
    takes,
    line: () => line,
    slots: chains.slots,
    noteAlive: watchStall(state, notes),
    noteLatency(samples) {
      latencySec.value = samples / (rateHz.peek() ?? RATE_BEFORE_START_HZ);
      outputLatencySec.value = line.sound()?.outputLatencySec() ?? null;
    },
  });

  /** Tells the processor what has changed in the design, and what is heard of it. */
  const update = () => {
    const sound = line.sound();
    const channels = line.channels();
    if (sound === null || channels === null) return;
    chains.update(sound.sampleRateHz, channels);
    matching.update();
  };
  watchMoves(document, update);

  const adapt = async (next: Source) => {
    const form = formOf(next);
    await line.adapt(form, source.feed);
    const playedHz = line.sound()?.sampleRateHz ?? form.sampleRateHz;
    if (playedHz === form.sampleRateHz) return;
    notes.add(
      'note',
      `This machine plays at ${playedHz} Hz; “${form.title}” (${form.sampleRateHz} Hz) is resampled to be heard, never to be rendered.`,
    );
  };

  const start = async () => {
    if (state.peek() === 'starting' || state.peek() === 'playing') return;
    const missing = parts.missingFeature();
    if (missing !== null) return fail(missing);
    state.value = 'starting';
    try {
      if (source.current() === null) await loadFirstSource();
      const open = line.sound();
      if (open !== null) await open.resume();
      // Another source may be chosen while this one is being opened.
      for (let adapted = open === null ? null : source.current(); adapted === null || adapted !== source.current(); ) {
        adapted = source.current();
        if (adapted === null) throw new Error('There is nothing to play. Choose a phrase or open a file.');
        await adapt(adapted);
      }
      // Stop may have been pressed meanwhile.
      if (state.peek() !== ('starting' as SoundState)) return suspend();
      pausedBySystem = false;
      state.value = 'playing';
      line.send({ type: 'mute', on: muted.peek() });
    } catch (error) {
      fail(error);
    }
  };

  const suspend = () => {
    line.sound()?.suspend().catch(fail);
  };

  const stop = () => {
    if (state.peek() !== 'starting' && state.peek() !== 'playing') return;
    state.value = 'stopped';
    takes().endTake();
    line.send({ type: 'mute', on: true });
    setTimeout(() => {
      if (state.peek() === 'stopped') suspend();
    }, MUTED_AFTER_MS);
  };

  const setMuted = (on: boolean) => {
    muted.value = on;
    if (state.peek() === 'playing') line.send({ type: 'mute', on });
  };

  return {
    sound: state,
    muted,
    hearing: hearing.hearing,
    hear: hearing.hear,
    previous: hearing.previous,
    residualPart: residual.residualPart,
    setResidualPart: residual.setResidualPart,
    residualGainDb: residual.residualGainDb,
    setResidualGainDb: residual.setResidualGainDb,
    matched: matching.matched,
    setMatched: matching.setMatched,
    matchDb: matching.matchDb,
    rateHz,
    latencySec,
    outputLatencySec,
    source: source.source,
    input: source.input,
    region: source.region,
    setRegion: source.setRegion,
    seek: source.seek,
    positionSec: source.positionSec,
    sourceSamples: source.sourceSamples,
    listenDb: loudness.listenDb,
    setListenDb: loudness.setListenDb,
    ceilingDbfs: loudness.ceilingDbfs,
    setCeilingDbfs: loudness.setCeilingDbfs,
    spectrumRateHz: computed(() => rateHz.value ?? RATE_BEFORE_START_HZ),
    start,
    stop,
    setMuted,
    async setSource(next) {
      const { title, sampleRateHz, channels } = formOf(next);
      try {
        compileChain(document.design.peek(), document.heardVariant.peek(), sampleRateHz, channels, 'lowLatency');
      } catch (error) {
        throw new RangeError(`“${title}” cannot be played: ${sentenceOf(error)}.`);
      }
      if (next.kind === 'live') setMuted(true);
      source.set(next);
      matching.noteSource();
      if (line.sound() === null) return;
      if (state.peek() === 'playing') await adapt(next).catch(fail);
      else await line.close();
    },
    forTakes: {
      record: (on, to) => line.send({ type: 'record', on, ...(to === undefined ? {} : { to }) }, to === undefined ? [] : [to]),
      channels: line.channels,
      plays: () => state.peek() === 'playing',
      play(take, name) {
        if (line.sound() === null || (take !== null && state.peek() !== 'playing')) return false;
        line.sound()?.playTake(take);
        if (take === null) endTakeHeard();
        else hearing.setAside(name);
        return true;
      },
      rateHz: () => rateHz.peek() ?? RATE_BEFORE_START_HZ,
      clip: source.clip,
      heardWords: hearing.words,
      hearsCell: () => hearing.heard() === 'cell',
    },
  };
}
