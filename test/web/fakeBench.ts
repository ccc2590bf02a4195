/** A bench for looking at the page without sound: a real document, and invented numbers that are plausible. No part of the build. */
import { computed, type Signal, signal } from '@preact/signals';
import { defaultDesign } from '../../model/design/defaults.ts';
import { feedbackFraction } from '../../model/design/feedback.ts';
import type { Design } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { TransferPath } from '../../model/study/transfer.ts';
import type {
  Bench,
  FeedbackPoint,
  Hearing,
  LiveLevels,
  Note,
  Region,
  SoundState,
  SourceInfo,
  Take,
  TransferPlane,
} from '../../web/state/bench.ts';
import { controlPicture } from '../../web/state/controlPicture.ts';
import { createDocument } from '../../web/state/document.ts';
import { createLimits } from '../../web/state/limits.ts';

export interface FakeOptions {
  readonly sound?: SoundState;
  readonly muted?: boolean;
  readonly notes?: readonly Note[];
  readonly takes?: readonly Take[];
  readonly underWay?: boolean;
  readonly source?: SourceInfo;
  /** Replaces values of the first variant, by path. */
  readonly values?: Readonly<Record<string, unknown>>;
  readonly saturated?: number;
  readonly unread?: boolean;
}

export function createFakeBench(options: FakeOptions = {}): Bench {
  const document = createDocument(named(defaultDesign()), () => undefined);
  document.addVariant();
  document.addVariant();
  document.hearVariant(0);
  for (const [path, value] of Object.entries(options.values ?? {})) {
    const refused = document.setValue(path, value);
    if (refused !== null) throw new Error(refused);
  }
  const sound = signal<SoundState>(options.sound ?? 'playing');
  const muted = signal(options.muted ?? false);
  const hearing = signal<Hearing>('cell');
  const listenDb = signal(-18);
  const ceilingDbfs = signal(-6);
  const toneV = signal(0.2);
  const toneHz = signal(997);
  const region = signal<Region | null>(null);
  const takes = signal<readonly Take[]>(options.takes ?? []);
  const notes = signal<readonly Note[]>(options.notes ?? []);
  const hints = signal(true);
  const none = () => undefined;
  const asyncNone = async () => undefined;
  const put = (target: { value: number }) => (value: number) => {
    target.value = value;
    return null;
  };
  const variant = computed(() => document.design.value.variants[document.heardVariant.value]);
  const k = computed(() => feedbackFraction(variant.value.cell));
  return {
    restored: Promise.resolve(),
    ...document,
    openDesign: asyncNone,
    openExample: asyncNone,
    saveDesign: none,
    examples: signal([
      { name: 'harbour', title: 'Harbour tremolo', scenario: 'A slow sine at instrument level, resistors from the drawer.' },
    ]),
    sound,
    start: async () => assign(sound, 'playing'),
    stop: () => assign(sound, 'stopped'),
    muted,
    setMuted: (on) => assign(muted, on),
    hearing,
    hear: (which) => {
      assign(hearing, which);
      return null;
    },
    previous: signal(null),
    residualPart: signal('distortion'),
    setResidualPart: () => null,
    residualGainDb: signal(20),
    setResidualGainDb: () => null,
    matched: signal(false),
    setMatched: none,
    matchDb: signal({ variants: [null, null, null], previous: null }),
    phrases: signal([
      { name: 'chords', title: 'Plucked chords' },
      { name: 'bass', title: 'Bass line' },
    ]),
    source: signal(options.source ?? { title: 'Plucked chords', seconds: 16, kind: 'phrase' }),
    choosePhrase: asyncNone,
    openAudio: asyncNone,
    openDropped: asyncNone,
    chooseTestTone: asyncNone,
    testToneHz: signal(997),
    setTestToneHz: () => null,
    testToneV: signal(0.2),
    setTestToneV: () => null,
    openInput: asyncNone,
    inputs: signal([]),
    input: signal(null),
    region,
    setRegion: (next) => {
      assign(region, next);
      return null;
    },
    seek: () => null,
    positionSec: () => 3.2,
    sourceSamples: () => [],
    outputLatencySec: signal(0.02),
    listenDb,
    setListenDb: put(listenDb),
    ceilingDbfs,
    setCeilingDbfs: put(ceilingDbfs),
    rateHz: signal(48000),
    latencySec: signal(0.002),
    live: signal(options.sound === 'idle' ? null : inventedLevels(muted.value)),
    moment: computed(() => ({
      levels: sound.value === 'playing' ? inventedLevels(muted.value) : null,
      reading: options.unread ? { fault: 'The cell cannot be solved here' } : inventedReading(k.value, options.saturated ?? 0),
      thdBand: [0.0037, 0.0057] as const,
      path: options.unread ? null : inventedPath(),
    })),
    swing: signal([
      { gateV: -1.8, gainDb: -0.1, rdsOhm: Number.POSITIVE_INFINITY },
      { gateV: -0.6, gainDb: -27.9, rdsOhm: 420 },
    ]),
    beyond: signal([
      { gateV: -1.9, gainDb: -0.1, rdsOhm: Number.POSITIVE_INFINITY },
      { gateV: 0, gainDb: -33, rdsOhm: 250 },
    ]),
    plane: signal(inventedPlane()),
    noise: signal([
      { gateV: -1.8, drainV: 1.8e-6 },
      { gateV: -0.6, drainV: 0.36e-6 },
    ]),
    period: computed(() => controlPicture(document.design.value, document.heardVariant.value, 997)),
    worst: computed(() => ({ thdFundamental: 0.04, gainDb: -2, gateV: -1.55 })),
    summaries: computed(() =>
      document.design.value.variants.map((_, n) => ({ restThd: 0.0047 + n / 100, worstThd: 0.04, gainDb: [-27.9, -0.1] as const })),
    ),
    feedbackCurve: signal({ gateV: -1.38, points: inventedCurve() }),
    toneV,
    setToneV: put(toneV),
    toneHz,
    setToneHz: put(toneHz),
    outputSamples: (into) => inventNoise(into, 0.2),
    inputSamples: (into) => inventNoise(into, 0.12),
    spectrumRateHz: signal(48000),
    takes,
    taking: signal(options.underWay ? { seconds: 7.3 } : null),
    rendering: signal(options.underWay ? { fraction: 0.42 } : null),
    startTake: none,
    endTake: none,
    renderClip: asyncNone,
    endRender: none,
    saveTake: asyncNone,
    takesLast: signal('lasting'),
    deleteTake: (id) =>
      assign(
        takes,
        takes.value.map((take) => (take.id === id ? { ...take, deleted: true } : take)),
      ),
    restoreTake: (id) =>
      assign(
        takes,
        takes.value.map((take) => (take.id === id ? { ...take, deleted: false } : take)),
      ),
    renameTake: (id, name) =>
      assign(
        takes,
        takes.value.map((take) => (take.id === id ? { ...take, name } : take)),
      ),
    playTake: asyncNone,
    playingTake: signal(null),
    limits: createLimits(),
    hints,
    putHintsAway: () => assign(hints, false),
    savePlot: none,
    notes,
    dismiss: (id) =>
      assign(
        notes,
        notes.value.filter((note) => note.id !== id),
      ),
  };
}

function assign<Value>(target: Signal<Value>, value: Value): void {
  target.value = value;
}

function named(design: Design): Design {
  const [first] = design.variants;
  const cell = { ...first.cell, controlOhm: 910e3, feedback: { kind: 'resistor', drainOhm: 1e6, blockingF: 100e-9 } } as const;
  const control = { source: 'lfo', shape: 'sine', rateHz: 4.2, fromV: -0.6, toV: -1.8, edgeSec: 0.005 } as const;
  return {
    ...design,
    title: 'Harbour tremolo',
    variants: [{ ...first, name: 'A', cell, control, output: { ...first.output, gainDb: 18 } }],
  };
}

function inventedLevels(muted: boolean): LiveLevels {
  return {
    controlV: -1.53,
    gateSourceV: -1.38,
    gateLowV: -1.4,
    gateHighV: -1.36,
    feedthroughPeakV: 0.0012,
    inputPeakV: 0.2,
    drainPeakV: 0.059,
    outputPeakDbfs: 7.4,
    outputRmsDbfs: -4,
    recentPeakDbfs: 0,
    heardPeakDbfs: muted ? Number.NEGATIVE_INFINITY : -17,
    heardRmsDbfs: muted ? Number.NEGATIVE_INFINITY : -22,
    variants: [7.4, 3, -2].map((peakDbfs) => ({ peakDbfs, faults: 0 })),
    loadFraction: 0.3,
    residualDb: null,
    atCeiling: false,
    faults: 0,
    underruns: 0,
  };
}

function inventedReading(k: number, saturated: number): ToneReading {
  const h2 = 0.19 * (0.5 - k) + 1e-6;
  const harmonic = (n: number, fraction: number) => ({
    n,
    amplitudeV: Math.abs(fraction) * 0.059,
    db: 20 * Math.log10(Math.abs(fraction)),
    phaseRad: fraction < 0 ? Math.PI : 0,
  });
  return {
    gainDb: -10.5,
    fundamentalV: 0.059,
    dcV: 0.0012,
    restDcV: 0.0001,
    thdFundamental: Math.hypot(h2, 2.4e-4),
    thdTotal: Math.hypot(h2, 2.4e-4),
    harmonics: [harmonic(1, 1), harmonic(2, h2), harmonic(3, -2e-4)],
    rdsOhm: 4250,
    vgsV: -1.38,
    regions: { ohmic: 1 - saturated, saturated, cutoff: 0, gateOn: 0 },
    gridPoints: 512,
    converged: true,
    fundamentalError: 1e-12,
    harmonicsError: 1e-9,
    settledByTime: false,
  };
}

/** A resistor of 4.25 kΩ. */
function inventedPath(): TransferPath {
  const drainSourceV = Float64Array.from({ length: 65 }, (_, n) => 0.059 * Math.cos((n * Math.PI) / 32));
  return { drainSourceV, drainA: drainSourceV.map((v) => v / 4250) };
}

function inventedPlane(): TransferPlane {
  const drainSourceV = Float64Array.from({ length: 41 }, (_, n) => 0.2 * (n / 20 - 1));
  const slopes = [2e-3, 1e-3, 5e-4, 2e-4];
  return {
    drainSourceV,
    curves: slopes.map((slopeS) => ({ gateV: -1.5 + slopeS / 2.67e-3, drainA: drainSourceV.map((v) => slopeS * v) })),
    edgeA: drainSourceV.map((v) => 1.33e-3 * v * Math.abs(v)),
    topA: 1.5e-4,
  };
}

function inventedCurve(): FeedbackPoint[] {
  return Array.from({ length: 41 }, (_, n) => {
    const k = 0.4 + n * 0.005;
    const h2Signed = 0.19 * (0.5 - k);
    const h3 = 2e-4 + 0.02 * (k - 0.5) ** 2;
    return { k, thd: Math.hypot(h2Signed, h3), h2Signed, h3 };
  });
}

function inventNoise(into: Float32Array, level: number): void {
  let seed = 7;
  let low = 0;
  for (let n = 0; n < into.length; n++) {
    seed = (seed * 1103515245 + 12345) % 2147483648;
    low += 0.05 * ((seed / 1073741824 - 1) * level - low);
    into[n] = low + 0.05 * level * Math.sin(n * 0.05) + 0.03 * level * Math.sin(n * 0.11);
  }
}
