/** Sound as the user knows it: start and stop, what is heard, how loud, from which source. */
import { computed, signal } from '@preact/signals';
import { compileChain } from '../../model/chain/compile.ts';
import type { ToCell } from '../../worklet/protocol.ts';
import { MUTE_SEC } from '../../worklet/protocol.ts';
import type { Clip } from '../audio/clip.ts';
import { clipSeconds } from '../audio/clip.ts';
import type { Bench, SoundState, SourceInfo } from './bench.ts';
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
  | 'rateHz'
  | 'latencySec'
  | 'spectrumRateHz';
type Level = 'listenDb' | 'setListenDb' | 'ceilingDbfs' | 'setCeilingDbfs';

export interface Listening extends Pick<Bench, Shared | Level> {
  /** Puts another clip in place of the source; sound that plays goes on. Rejects, and changes nothing, where the clip cannot be played. */
  setSource(clip: Clip, kind: SourceInfo['kind']): Promise<void>;
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
  const source = signal<SourceInfo>({ title: '', seconds: 0, kind: 'phrase' });
  let clip: Clip | null = null;
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
    ...{ document, previous: before, notes, slots: chains.slots, send, clip: () => clip },
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
    noteLatency(samples) {
      latencySec.value = samples / (rateHz.peek() ?? RATE_BEFORE_START_HZ);
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

  const adapt = async (next: Clip) => {
    await line.adapt(next);
    const playedHz = line.sound()?.sampleRateHz ?? next.sampleRateHz;
    if (playedHz === next.sampleRateHz) return;
    notes.add(
      'note',
      `This machine plays at ${playedHz} Hz; “${next.title}” (${next.sampleRateHz} Hz) is resampled to be heard, never to be rendered.`,
    );
  };

  const start = async () => {
    if (state.peek() === 'starting' || state.peek() === 'playing') return;
    const missing = parts.missingFeature();
    if (missing !== null) return fail(missing);
    state.value = 'starting';
    try {
      if (clip === null) await loadFirstSource();
      if (clip === null) throw new Error('There is nothing to play. Choose a phrase or open a file.');
      const open = line.sound();
      if (open !== null) await open.resume();
      // Another source may be chosen while this one is being opened.
      for (let adapted: Clip | null = open === null ? null : clip; adapted !== clip; ) {
        adapted = clip;
        await adapt(clip);
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
    source,
    listenDb: loudness.listenDb,
    setListenDb: loudness.setListenDb,
    ceilingDbfs: loudness.ceilingDbfs,
    setCeilingDbfs: loudness.setCeilingDbfs,
    spectrumRateHz: computed(() => rateHz.value ?? RATE_BEFORE_START_HZ),
    start,
    stop() {
      if (state.peek() !== 'starting' && state.peek() !== 'playing') return;
      state.value = 'stopped';
      takes().endTake();
      line.send({ type: 'mute', on: true });
      setTimeout(() => {
        if (state.peek() === 'stopped') suspend();
      }, MUTED_AFTER_MS);
    },
    setMuted(on) {
      muted.value = on;
      if (state.peek() === 'playing') line.send({ type: 'mute', on });
    },
    async setSource(next, kind) {
      try {
        compileChain(document.design.peek(), document.heardVariant.peek(), next.sampleRateHz, next.channels.length, 'lowLatency');
      } catch (error) {
        throw new RangeError(`“${next.title}” cannot be played: ${sentenceOf(error)}.`);
      }
      clip = next;
      matching.noteSource();
      source.value = { title: next.title, seconds: clipSeconds(next), kind };
      if (line.sound() === null) return;
      if (state.peek() === 'playing') await adapt(next).catch(fail);
      else await line.close();
    },
    forTakes: {
      record: (on) => (state.peek() === 'playing' || !on ? line.send({ type: 'record', on }) : false),
      play(take, name) {
        if (line.sound() === null || (take !== null && state.peek() !== 'playing')) return false;
        line.sound()?.playTake(take);
        if (take === null) endTakeHeard();
        else hearing.setAside(name);
        return true;
      },
      rateHz: () => rateHz.peek() ?? RATE_BEFORE_START_HZ,
      clip: () => clip,
      heardWords: hearing.words,
      hearsCell: () => hearing.heard() === 'cell',
    },
  };
}
