import { type ReadonlySignal, useSignal } from '@preact/signals';
import type { ComponentChildren } from 'preact';
import { useMemo } from 'preact/hooks';
import type { PlotTable } from '../draw/plotData.ts';
import { type PlotArea, plotArea } from '../draw/plotArea.ts';
import { linearScale, logScale, type Scale, toPixel } from '../draw/scale.ts';
import { harmonicSticks, type Spectrum, spectrumPoints, type Stick } from '../draw/spectrumPlot.ts';
import { createSpectrumReader } from '../draw/spectrumSource.ts';
import type { Trace } from '../draw/traces.ts';
import { decimals } from '../draw/words.ts';
import { formatQuantity } from '../../model/design/values.ts';
import { dbFromPower } from '../../model/measure/spectrum.ts';
import type { Bench, Moment } from '../state/bench.ts';
import { useBench, useBenchView, useVariant } from './BenchContext.ts';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { type Drawing, PlotFigure } from './parts/PlotFigure.tsx';
import { TraceCanvas } from './parts/TraceCanvas.tsx';
import { SignalChoice, type SignalView } from './SignalChoice.tsx';
import { useHeldTop } from './useHeldTop.ts';
import { type WaveformView, waveformDrawing } from './waveformDrawing.tsx';

const MARGINS = { left: 46, right: 14, top: 8, bottom: 24 };
const LOWEST_DB = -120;
const HZ = [20, 100, 1000, 10000] as const;

/** Fig. 4: what goes in and what comes out, as spectrum or as waveforms. */
export function SpectrumFigure() {
  const { bench, moment } = useBenchView();
  const view = useSignal<SignalView>('spectrum');
  const spanSec = useSignal(0.02);
  const sticks = useSticks();
  const silent = bench.sound.value === 'idle';
  const read = useMemo(() => createReaders(bench), [bench]);
  const waveforms: WaveformView = { bench, spanSec: spanSec.value, topV: useHeldTop(), silent };
  const isSpectrum = view.value === 'spectrum';
  return (
    <PlotFigure
      key={view.value}
      number={4}
      className="spectrum-figure"
      title={isSpectrum ? 'Spectrum' : 'Waveforms'}
      lead={<SignalChoice view={view} spanSec={spanSec} />}
      caption={isSpectrum ? ', in (grey) and out.' : ', in (grey) and out, from a rise through 0.'}
      draw={(width, height) =>
        isSpectrum ? spectrumDrawing({ read, sticks, moment, silent }, width, height) : waveformDrawing(waveforms, width, height)
      }
    />
  );
}

/** The shadow tone's harmonics at the output, of a moment. */
type Sticks = (moment: Moment | null, x: Scale, y: Scale) => Stick[];

function useSticks(): Sticks {
  const bench = useBench();
  const { gainDb } = useVariant().output;
  const at = { toneHz: bench.toneHz.value, gainDb, fullScaleV: bench.design.value.fullScaleV };
  return (moment, x, y) => {
    const reading = moment?.reading ?? null;
    return reading === null || 'fault' in reading ? [] : harmonicSticks(reading.harmonics, at, x, y);
  };
}

interface Spectra {
  readonly before: Spectrum;
  readonly after: Spectrum;
}

function createReaders(bench: Bench): () => Spectra {
  const readInput = createSpectrumReader(bench.inputSamples);
  const readOutput = createSpectrumReader(bench.outputSamples);
  return () => {
    const rateHz = bench.spectrumRateHz.peek();
    return { before: readInput(rateHz), after: readOutput(rateHz) };
  };
}

interface SpectrumView {
  readonly read: () => Spectra;
  readonly sticks: Sticks;
  readonly moment: ReadonlySignal<Moment | null>;
  readonly silent: boolean;
}

function spectrumDrawing({ read, sticks, moment, silent }: SpectrumView, width: number, height: number): Drawing {
  const area = plotArea(width, height, MARGINS);
  const x = logScale(20, 20000, area.left, area.right);
  const y = linearScale(LOWEST_DB, 0, area.bottom, area.top);
  const xTicks = HZ.map((hz, n) => ({
    at: toPixel(x, hz),
    words: `${hz >= 1000 ? `${hz / 1000}\u2009k` : hz}${n === HZ.length - 1 ? 'Hz' : ''}`,
  }));
  const yTicks = [0, -30, -60, -90].map((db) => ({ at: toPixel(y, db), words: db === 0 ? '0\u2009dBFS' : decimals(db, 0) }));
  const traces = (): Trace[] => {
    const { before, after } = read();
    return [
      { points: spectrumPoints(before, x, y), ink: '--ink3', width: 0.9 },
      { points: spectrumPoints(after, x, y), ink: '--now', width: 1.5 },
    ];
  };
  const frame = <PlotFrame area={area} xTicks={xTicks} yTicks={yTicks} />;
  return {
    area,
    x,
    tables: () => spectrumTables(read(), sticks(moment.peek(), x, y)),
    traces,
    picture: (
      <>
        <Picture area={area} frame={frame} traces={traces} sticks={() => sticks(moment.value, x, y)} />
        {silent && <p class="aside plot-word">no sound yet</p>}
      </>
    ),
  };
}

interface PictureProps {
  readonly area: PlotArea;
  readonly frame: ComponentChildren;
  readonly traces: () => Trace[];
  readonly sticks: () => readonly Stick[];
}

/** Apart, so that the sticks of the moment draw nothing else anew. */
function Picture({ area, frame, traces, sticks }: PictureProps) {
  const standing = sticks();
  const viewBox = `0 0 ${area.width} ${area.height}`;
  return (
    <>
      <svg viewBox={viewBox} aria-hidden="true">
        {frame}
        {standing.map(({ n, x: across, y: top }) => (
          <path key={n} class="stick" d={`M${across} ${area.bottom}V${top}`} />
        ))}
      </svg>
      <TraceCanvas area={area} traces={traces} label={spoken(standing)} />
      <svg class="over-canvas" viewBox={viewBox} aria-hidden="true">
        {namedOf(standing).map(({ n, x: across, y: top }) => (
          <text key={n} class="note-text halo stick-text" x={across} y={Math.max(area.top + 11, top - 4)} text-anchor="middle">
            {n}
          </text>
        ))}
        {standing.length > 0 && (
          <text class="note-text halo" x={area.right - 6} y={area.top + 13} text-anchor="end">
            shadow tone
          </text>
        )}
      </svg>
    </>
  );
}

/** A stick's number takes so much, pixels: high orders stand closer than that, and are named where there is room. */
const NUMBER_WIDE = 10;

function namedOf(sticks: readonly Stick[]): Stick[] {
  const named: Stick[] = [];
  for (const stick of sticks) {
    const last = named.at(-1);
    if (last === undefined || stick.x - last.x >= NUMBER_WIDE) named.push(stick);
  }
  return named;
}

function spoken(sticks: readonly Stick[]): string {
  const levels = sticks.map(({ n, dbfs }) => `${n} at ${decimals(dbfs, 1)} dBFS`);
  return `Spectrum of the input and of the output${levels.length > 0 ? `; harmonics of the shadow tone: ${levels.join(', ')}` : ''}`;
}

const dbText = (db: number) => `${decimals(db, 1)}\u2009dB`;
const hzText = (hz: number) => formatQuantity(hz, 'Hz', 3);

const levelsOf = ({ powers }: Spectrum) => Float64Array.from(powers, dbFromPower);

function spectrumTables({ before, after }: Spectra, sticks: readonly Stick[]): PlotTable[] {
  const hz = Float64Array.from(after.powers, (_, n) => n * after.binHz);
  const level = (name: string, values: ArrayLike<number>) => ({ name, unit: 'dBFS', values, print: dbText });
  return [
    {
      x: { name: 'frequency', unit: 'Hz', values: hz, print: hzText },
      ys: [level('in', levelsOf(before)), level('out', levelsOf(after))],
      keeps: 'highest',
    },
    {
      x: { name: 'shadow tone', unit: 'Hz', values: sticks.map((stick) => stick.hz), print: hzText },
      ys: [
        level(
          'shadow tone, out',
          sticks.map(({ dbfs }) => dbfs),
        ),
      ],
    },
  ];
}
