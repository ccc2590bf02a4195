import { useSignal } from '@preact/signals';
import { useMemo } from 'preact/hooks';
import type { PlotTable } from '../draw/plotData.ts';
import { plotArea } from '../draw/plotArea.ts';
import { linearScale, logScale, type Scale, toPixel } from '../draw/scale.ts';
import { harmonicSticks, type Spectrum, spectrumPoints, type Stick } from '../draw/spectrumPlot.ts';
import { createSpectrumReader } from '../draw/spectrumSource.ts';
import type { Trace } from '../draw/traces.ts';
import { decimals } from '../draw/words.ts';
import { formatQuantity } from '../../model/design/values.ts';
import type { Bench } from '../state/bench.ts';
import { useBench, useReading, useVariant } from './BenchContext.ts';
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
  const bench = useBench();
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
        isSpectrum ? spectrumDrawing({ read, sticks, silent }, width, height) : waveformDrawing(waveforms, width, height)
      }
    />
  );
}

/** The shadow tone's harmonics at the output. */
function useSticks(): (x: Scale, y: Scale) => Stick[] {
  const bench = useBench();
  const reading = useReading();
  const { gainDb } = useVariant().output;
  const at = { toneHz: bench.toneHz.value, gainDb, fullScaleV: bench.design.value.fullScaleV };
  return (x, y) => (reading === null ? [] : harmonicSticks(reading.harmonics, at, x, y));
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
  readonly sticks: (x: Scale, y: Scale) => Stick[];
  readonly silent: boolean;
}

function spectrumDrawing({ read, sticks, silent }: SpectrumView, width: number, height: number): Drawing {
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
  const standing = sticks(x, y);
  return {
    area,
    x,
    tables: () => spectrumTables(read(), standing),
    traces,
    picture: (
      <>
        <svg viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <PlotFrame area={area} xTicks={xTicks} yTicks={yTicks} />
          {standing.map(({ n, x: across, y: top }) => (
            <path key={n} class="stick" d={`M${across} ${area.bottom}V${top}`} />
          ))}
        </svg>
        <TraceCanvas area={area} traces={traces} label={spoken(standing)} />
        <svg class="over-canvas" viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
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
        {silent && <p class="aside plot-word">no sound yet</p>}
      </>
    ),
  };
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

function spectrumTables({ before, after }: Spectra, sticks: readonly Stick[]): PlotTable[] {
  const hz = Float64Array.from(after.dbfs, (_, n) => n * after.binHz);
  const level = (name: string, values: ArrayLike<number>) => ({ name, unit: 'dBFS', values, print: dbText });
  return [
    {
      x: { name: 'frequency', unit: 'Hz', values: hz, print: hzText },
      ys: [level('in', before.dbfs), level('out', after.dbfs)],
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
