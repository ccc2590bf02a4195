/**
 * The bench: everything that the page shows and everything that it can ask for. Panels know this interface and nothing behind it,
 * so a test can stand a fake in its place; `createBench.ts` makes the real one.
 *
 * Every call that can be refused returns the sentence to show, or null when it was taken; a refused call changes nothing.
 * Signals of numbers that are measured now are null until sound has run.
 */
import type { ReadonlySignal } from '@preact/signals';
import type { ResidualPart } from '../../model/chain/residual.ts';
import type { Moves } from '../../model/design/feedback.ts';
import type { Design, Variant } from '../../model/design/types.ts';
import type { ToneReading } from '../../model/study/tone.ts';
import type { TransferPath } from '../../model/study/transfer.ts';
import type { Limits } from './limits.ts';

export interface Bench {
  /** Resolves when the design and the settings of the last visit are in place, or there are none. */
  readonly restored: Promise<void>;

  // The document
  readonly design: ReadonlySignal<Design>;
  readonly heardVariant: ReadonlySignal<number>;
  hearVariant(index: number): void;
  /** Appends a copy of the heard variant under the next letter and hears it; refused when there are four. */
  addVariant(): string | null;
  /** What setting k leaves alone: the gate's bias and swing, or the control voltage. */
  readonly keep: ReadonlySignal<Keep>;
  setKeep(keep: Keep): void;
  /** Which resistors of the pair setting k moves. */
  readonly moves: ReadonlySignal<Moves>;
  setMoves(moves: Moves): void;
  /** `path` is relative to the heard variant: `cell.seriesOhm`. Changes of one path in quick succession (a drag) undo as one. */
  setValue(path: string, value: unknown): string | null;
  /** Several values together, in order, as one change. */
  setValues(changes: readonly (readonly [path: string, value: unknown])[]): string | null;
  setDesignValue(path: DesignPath, value: unknown): string | null;
  setFeedbackFraction(k: number): string | null;
  undo(): void;
  redo(): void;
  readonly canUndo: ReadonlySignal<boolean>;
  readonly canRedo: ReadonlySignal<boolean>;
  /** A design, or a WAV file with one inside. Faults of a file go to `notes`; the document stays as it was. */
  openDesign(file: File): Promise<void>;
  openExample(name: string): Promise<void>;
  /** Downloads the design as JSON. */
  saveDesign(): void;
  readonly examples: ReadonlySignal<readonly ExampleEntry[]>;

  // Sound
  readonly sound: ReadonlySignal<SoundState>;
  /** Called from a user's gesture. Resolves when sound plays or has failed (then `notes` says why). */
  start(): Promise<void>;
  stop(): void;
  /** Mutes with a ramp; the chain and every reading go on. */
  readonly muted: ReadonlySignal<boolean>;
  setMuted(on: boolean): void;
  /** All variants run at once; the heard one, what its cell adds, its setting before the last change, or the bypass is let through, without a click. */
  readonly hearing: ReadonlySignal<Hearing>;
  /** Refused for `previous` where the heard variant has none. */
  hear(which: Hearing): string | null;
  /** The part of what the heard variant's cell adds that «residual» lets through, and its gain, dB, 0 to 80. */
  readonly residualPart: ReadonlySignal<ResidualPart>;
  setResidualPart(part: ResidualPart): string | null;
  readonly residualGainDb: ReadonlySignal<number>;
  setResidualGainDb(db: number): string | null;
  /** The heard variant before its last change; null where there was none. */
  readonly previous: ReadonlySignal<Variant | null>;
  /** Whether variants and the previous setting are heard at the loudness of the source, which is that of the bypass. */
  readonly matched: ReadonlySignal<boolean>;
  setMatched(on: boolean): void;
  /** Gains to the loudness of the source, measured by BS.1770 on a render of it (of its first minute); measured only while `matched` is on. */
  readonly matchDb: ReadonlySignal<MatchDb>;
  readonly phrases: ReadonlySignal<readonly { readonly name: string; readonly title: string; readonly listenFor?: string }[]>;
  readonly source: ReadonlySignal<SourceInfo>;
  choosePhrase(name: string): Promise<void>;
  openAudio(file: File): Promise<void>;
  /** A design is opened, anything else is heard through the cell; of several files the first, and `notes` say so. */
  openDropped(files: readonly File[]): Promise<void>;
  /** A sine, from one to 20000 Hz, of so many V peak at the cell's input whatever full scale is. */
  chooseTestTone(): Promise<void>;
  readonly testToneHz: ReadonlySignal<number>;
  setTestToneHz(hz: number): string | null;
  readonly testToneV: ReadonlySignal<number>;
  setTestToneV(volts: number): string | null;
  /**
   * Live input from a device, or from the one that the browser proposes; it may ask for permission. Begins muted. Where it cannot be opened `notes`
   * say why, and what plays goes on.
   */
  openInput(deviceId?: string): Promise<void>;
  /** The devices there are, once one was opened. */
  readonly inputs: ReadonlySignal<readonly { readonly id: string; readonly title: string }[]>;
  readonly input: ReadonlySignal<InputInfo | null>;
  /** The part of the source that loops; null for the whole. Its end runs into its beginning by a crossfade of 10 ms. */
  readonly region: ReadonlySignal<Region | null>;
  /** Refused outside the source or under 50 ms. */
  setRegion(region: Region | null): string | null;
  /** Goes on from another place by a crossfade of 20 ms; refused outside what loops. */
  seek(seconds: number): string | null;
  /** Where in the source the sound is, s. */
  positionSec(): number;
  /** The whole source, its channels; none for live input. */
  sourceSamples(): readonly Float32Array[];
  /** Monitoring level after the chain's output, dB, −60 to 0. */
  readonly listenDb: ReadonlySignal<number>;
  setListenDb(db: number): string | null;
  /** No sample leaves above this, dBFS, −40 to 0. */
  readonly ceilingDbfs: ReadonlySignal<number>;
  setCeilingDbfs(db: number): string | null;
  /** Rate at which the context and the chain run, Hz; null before the first start. */
  readonly rateHz: ReadonlySignal<number | null>;
  /** Delay of the chain, input to output, s; null before the first start. */
  readonly latencySec: ReadonlySignal<number | null>;
  /** Delay from the chain to the output device, s; null before the first start and where the browser does not state it. */
  readonly outputLatencySec: ReadonlySignal<number | null>;

  // Measured now
  /** At the rate of the processor's reports. */
  readonly live: ReadonlySignal<LiveLevels | null>;
  /** What belongs to one moment, 10 to 15 times a second while sound plays: a report, and the shadow tone at that report's gate voltage. */
  readonly moment: ReadonlySignal<Moment | null>;
  /** The highest THD over the control's whole swing. */
  readonly worst: ReadonlySignal<WorstReading | null>;
  /** The shadow tone over the swing, ascending in the gate's voltage. */
  readonly swing: ReadonlySignal<readonly SwingPoint[] | null>;
  /** For each variant, null where it is not known yet or cannot be read. */
  readonly summaries: ReadonlySignal<readonly (VariantSummary | null)[]>;
  /** The shadow tone at gate voltages outside the swing, ascending: on to 0 V, and past VGS(off). */
  readonly beyond: ReadonlySignal<readonly SwingPoint[] | null>;
  /** What the shadow tone's path is drawn on; null while it is being computed, or where the cell cannot be. */
  readonly plane: ReadonlySignal<TransferPlane | null>;
  /** Noise over the swing, ascending in the gate's voltage; null while it is being computed. */
  readonly noise: ReadonlySignal<readonly NoisePoint[] | null>;
  /** What the control does to the heard variant, by itself over a period or with a tone at its input, or why that cannot be said; null until the first answer. */
  readonly period: ReadonlySignal<ControlPicture | { readonly fault: string } | null>;
  /** THD against k at the gate voltage of a moment just past (at rest while sound is stopped), as often as can be computed. */
  readonly feedbackCurve: ReadonlySignal<FeedbackCurve | null>;
  /** The shadow tone at the cell's input, V peak. */
  readonly toneV: ReadonlySignal<number>;
  setToneV(volts: number): string | null;
  readonly toneHz: ReadonlySignal<number>;
  setToneHz(hz: number): string | null;
  /** Fills `into` with the latest samples of what the chain puts out, oldest first; zeros where there are none yet. At most 32768. */
  outputSamples(into: Float32Array): void;
  /** The same for what goes into the chain. */
  inputSamples(into: Float32Array): void;
  readonly spectrumRateHz: ReadonlySignal<number>;

  // Takes
  /** How long takes stay: until the page closes; in this browser, which may remove them when it is short of room; in this browser for good. */
  readonly takesLast: ReadonlySignal<TakesLast>;
  readonly takes: ReadonlySignal<readonly Take[]>;
  readonly taking: ReadonlySignal<{ readonly seconds: number } | null>;
  readonly rendering: ReadonlySignal<{ readonly fraction: number } | null>;
  /** Records what is heard (variant, previous setting, bypass or a take, matched or not) before the listening level and the ceiling. */
  startTake(): void;
  endTake(): void;
  /** Renders the whole source through the heard variant, off the audio thread, with the linear-phase filters. */
  renderClip(): Promise<void>;
  endRender(): void;
  /** Downloads a WAV file with the take's design inside. */
  saveTake(id: number, format: TakeFormat): Promise<void>;
  /**
   * Marks a take as deleted; `restoreTake` takes that back as long as it is in the list. The last three stay while there is room; of others
   * nothing is kept.
   */
  deleteTake(id: number): void;
  restoreTake(id: number): void;
  renameTake(id: number, name: string): void;
  /** Plays a take once in place of the chain's output, at the listening level and under the ceiling; null ends it. */
  playTake(id: number | null): Promise<void>;
  readonly playingTake: ReadonlySignal<number | null>;

  /** What the designer asks of the circuit. */
  readonly limits: Limits;
  /** Hints for a first visit, until they are put away. */
  readonly hints: ReadonlySignal<boolean>;
  putHintsAway(): void;
  /** Downloads a figure's numbers or picture; the design's title is put before `name`. */
  savePlot(name: string, kind: PlotFile, text: string): void;

  // What the user must be told, newest last
  readonly notes: ReadonlySignal<readonly Note[]>;
  dismiss(id: number): void;
}

export type Keep = 'gate' | 'control';
export type Hearing = 'cell' | 'bypass' | 'previous' | 'residual';
export type SoundState = 'idle' | 'starting' | 'playing' | 'stopped' | 'failed';
export type DesignPath = 'fullScaleV' | 'tempC' | 'oversampling' | 'title';
export type TakesLast = 'page' | 'browser' | 'lasting';
/** Samples are rounded to the nearest step; with dither, after triangular noise of two steps' width. */
export type TakeFormat = 'pcm16' | 'pcm16 dithered' | 'pcm24' | 'pcm24 dithered' | 'float32';

export type PlotFile = 'csv' | 'svg';

export interface ExampleEntry {
  readonly name: string;
  readonly title: string;
  readonly scenario: string;
  readonly listenFor?: string;
}

/** Live input has no length: 0 s. */
export interface SourceInfo {
  readonly title: string;
  readonly seconds: number;
  readonly kind: 'phrase' | 'file' | 'tone' | 'live';
}

export interface Region {
  readonly fromSec: number;
  readonly toSec: number;
}

/** Live input that is open. */
export interface InputInfo {
  readonly title: string;
  readonly deviceId: string;
  readonly sampleRateHz: number;
  readonly channels: number;
  /** From the device to the page, as the browser states it; null where it does not. */
  readonly latencySec: number | null;
}

/** dB; null while not measured, 0 where a render is silent. More than 40 dB either way is shown but not applied, and said. */
export interface MatchDb {
  readonly variants: readonly (number | null)[];
  readonly previous: number | null;
}

/** Of the time since the last report (about 1/30 s), unless it says otherwise. dBFS of silence is −Infinity. */
export interface LiveLevels {
  readonly controlV: number;
  /** Of the first channel, without the audio that rides on it. */
  readonly gateSourceV: number;
  /** The least and the highest that it was. */
  readonly gateLowV: number;
  readonly gateHighV: number;
  /** What the control alone leaves at the drain, peak. */
  readonly feedthroughPeakV: number;
  readonly inputPeakV: number;
  readonly drainPeakV: number;
  /** Of the heard variant's output, before matching and the listening level, whatever is let through. */
  readonly outputPeakDbfs: number;
  readonly outputRmsDbfs: number;
  /** The highest output peak of the last 1.5 s. */
  readonly recentPeakDbfs: number;
  /** Of what leaves for the loudspeakers, after level, mute and ceiling. */
  readonly heardPeakDbfs: number;
  readonly heardRmsDbfs: number;
  /** Level of the residual, before its gain, re the heard variant's output, over the last second; null while none is heard or the output is silent. */
  readonly residualDb: number | null;
  /** True while the ceiling turns the sound down. */
  readonly atCeiling: boolean;
  /** Since the start: times that the chain fell back to its last good values. */
  readonly faults: number;
  /** Of every variant that runs: output peak, and its own faults. */
  readonly variants: readonly { readonly peakDbfs: number; readonly faults: number }[];
  /** What part of the time that it has the sound takes to compute, a mean over some seconds; above 1 there are gaps. */
  readonly loadFraction: number;
  /** Since the start: gaps in the sound because the machine was late. */
  readonly underruns: number;
}

export interface Moment {
  /** Null while sound is stopped: the reading is then at the control's rest. */
  readonly levels: LiveLevels | null;
  readonly reading: ToneReading | { readonly fault: string };
  /** The least and the highest THD that parts of 1 % make of this k, fractions; null without feedback. */
  readonly thdBand: readonly [number, number] | null;
  /** The shadow tone's path on the transfer plane; null where there is no reading. */
  readonly path: TransferPath | null;
}

/** Drain current against drain-source voltage of the FET alone, as wide as the shadow tone goes over the swing. */
export interface TransferPlane {
  /** Ascending, from −V to +V, 0 in its middle. */
  readonly drainSourceV: Float64Array;
  /** By gate voltages, steepest first: A at each of `drainSourceV`. */
  readonly curves: readonly { readonly gateV: number; readonly drainA: Float64Array }[];
  /** Where the channel leaves its ohmic region, A at each of `drainSourceV`. */
  readonly edgeA: Float64Array;
  /** The highest current worth showing, A. */
  readonly topA: number;
}

/** One period of the control without audio. */
export interface GatePeriod {
  /** One period, s; of a control that does not move, 1 s to draw it over. */
  readonly seconds: number;
  /** V at even times, the last value equal to the first: the period is closed. */
  readonly control: Float64Array;
  readonly gate: Float64Array;
  readonly drain: Float64Array;
  readonly steady: boolean;
  /** VGS(off) at the temperature of the circuit, V, negative for an n-channel part. */
  readonly gateOffV: number;
  /** Size of the forward gate voltage from which the gate is said to conduct, V. */
  readonly gateOnV: number;
}

/** What a follower makes of a steady tone at the input: V peak, ascending where its control moves one way. */
export interface FollowerCurve {
  readonly levelV: Float64Array;
  readonly control: Float64Array;
  readonly gate: Float64Array;
  readonly gateOffV: number;
  readonly gateOnV: number;
}

export type ControlPicture = GatePeriod | FollowerCurve;

export interface WorstReading {
  readonly thdFundamental: number;
  readonly gainDb: number;
  readonly gateV: number;
}

/** A variant by the shadow tone, fractions: with its control at rest, and the highest over its swing. */
export interface VariantSummary {
  readonly restThd: number;
  readonly worstThd: number;
  /** Least and highest gain over the swing, dB. */
  readonly gainDb: readonly [number, number];
}

/** The shadow tone at one gate voltage of the swing. */
export interface SwingPoint {
  readonly gateV: number;
  readonly gainDb: number;
  /** Infinity when cut off. */
  readonly rdsOhm: number;
}

/** Noise where the cell ends, 20 Hz to 20 kHz, V rms. */
export interface NoisePoint {
  readonly gateV: number;
  readonly drainV: number;
}

/** Ascending in k. */
export interface FeedbackCurve {
  readonly gateV: number;
  readonly points: readonly FeedbackPoint[];
}

export interface FeedbackPoint {
  readonly k: number;
  /** Re the fundamental, fractions. */
  readonly thd: number;
  /** Second harmonic with its sign: plus, raise k; minus, lower it. */
  readonly h2Signed: number;
  readonly h3: number;
}

/** `variant` says what was heard, in order: «A», «bypass», «A then B». k is the heard variant's feedback fraction when the take began; null where it was not the cell. */
export interface Take {
  readonly id: number;
  readonly name: string;
  readonly variant: string;
  readonly k: number | null;
  /** Text of the design as it was when the take began, the heard variant first; null where that is not known any more. */
  readonly design: string | null;
  readonly seconds: number;
  readonly sampleRateHz: number;
  readonly how: 'heard' | 'rendered';
  readonly deleted: boolean;
}

export interface Note {
  readonly id: number;
  readonly kind: 'fault' | 'note';
  readonly sentence: string;
  readonly advice?: string;
  /** Sentences under the first, where there are several of one kind: every fault of a file. */
  readonly list?: readonly string[];
  /** What can be done about it; once done, the note is put away. */
  readonly offer?: { readonly words: string; readonly run: () => void };
}
