import { useSignal } from '@preact/signals';
import { useMemo } from 'preact/hooks';
import { type GatePlot, isFollower, plotGate, regionAt } from '../draw/gatePlot.ts';
import { createGateSweep, sweepLines, type SweepReading } from '../draw/gateSweep.ts';
import type { PlotTable } from '../draw/plotData.ts';
import type { Trace } from '../draw/traces.ts';
import { dbuFromPeak, decimals, gateVolts, voltsText } from '../draw/words.ts';
import type { ControlPicture } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { GatePicture } from './GatePicture.tsx';
import { Choice, chosen } from './parts/Choice.tsx';
import { type Drawing, PlotFigure } from './parts/PlotFigure.tsx';
import { TraceCanvas } from './parts/TraceCanvas.tsx';
import { useGateSweep } from './useGateSweep.ts';

type View = 'control' | 'time';

/** Time that the gate is written over, s. */
const SWEEP_SEC = 10;

/** Fig. 3: the gate over one period of the control, or over the level of a tone, with its regions in a strip below; or as it goes, over time. */
export function GateFigure() {
  const found = useBench().period.value;
  const picture = found === null || 'fault' in found ? null : found;
  const view = useSignal<View>('control');
  const sweep = useMemo(() => createGateSweep(SWEEP_SEC), []);
  useGateSweep(sweep);
  const overTime = view.value === 'time';
  const drawn = (width: number, height: number): Drawing | null => {
    if (picture === null) return null;
    const plot = plotGate(picture, width, height, overTime ? SWEEP_SEC : null);
    return overTime ? timeDrawing(plot, picture, sweep) : controlDrawing(plot, picture);
  };
  return (
    <PlotFigure
      key={view.value}
      number={3}
      className="gate-figure"
      title="Gate voltage"
      lead={
        <>
          Gate{' '}
          <Choice
            label="What the gate is drawn against in Fig. 3"
            value={view.value}
            options={[
              { value: 'control', words: subject(picture) },
              { value: 'time', words: `over ${SWEEP_SEC}\u2009s` },
            ]}
            onChoose={chosen((next) => (view.value = next))}
          />
        </>
      }
      caption={overTime ? ', as it goes.' : <Key picture={picture} />}
      draw={drawn}
      empty={found !== null && 'fault' in found && <p class="unread empty-plot">{found.fault}</p>}
    />
  );
}

function subject(picture: ControlPicture | null): string {
  if (picture === null) return 'by its control';
  if (isFollower(picture)) return 'by level of a tone';
  return picture.steady ? 'at a fixed control' : 'over a period';
}

/** What the strip's fillings mean, of those that are there. */
function Key({ picture }: { readonly picture: ControlPicture | null }) {
  const seen = picture === null ? [] : Array.from(picture.gate, (v) => regionAt(v, picture));
  const conducting = seen.includes('conducting');
  return <>; filled ohmic, empty off{conducting && ', hatched conducting'}.</>;
}

const secondsText = (sec: number) => `${decimals(sec, 3)}\u2009s`;

function controlDrawing(plot: GatePlot, picture: ControlPicture): Drawing {
  const { gate, control } = picture;
  const x = isFollower(picture)
    ? { name: 'level', unit: 'V', values: picture.levelV, print: (volts: number) => `${decimals(dbuFromPeak(volts), 1)}\u2009dBu` }
    : { name: 'time', unit: 's', values: gate.map((_, n) => (n / (gate.length - 1)) * picture.seconds), print: secondsText };
  const tables: PlotTable[] = [
    {
      x,
      ys: [
        { name: 'gate', unit: 'V', values: gate, print: gateVolts },
        { name: 'control', unit: 'V', values: control, print: gateVolts },
      ],
    },
  ];
  return { area: plot.area, x: plot.x, tables: () => tables, picture: <GatePicture plot={plot} picture={picture} /> };
}

function timeDrawing(plot: GatePlot, picture: ControlPicture, sweep: ReturnType<typeof createGateSweep>): Drawing {
  const { area, x, y } = plot;
  const traces = (): Trace[] => {
    const { now, before } = sweepLines(sweep.readings(), SWEEP_SEC, x, y);
    return [
      { points: before, ink: '--ink3', width: 0.9 },
      { points: now, ink: '--now', width: 1.8 },
    ];
  };
  return {
    area,
    x,
    tables: () => [sweepTable(sweep.readings())],
    traces,
    picture: (
      <>
        <GatePicture plot={plot} picture={picture} sweepSec={SWEEP_SEC} />
        <TraceCanvas area={area} traces={traces} label={`The gate as it goes, ${voltsText(picture.gateOffV)} being VGS(off)`} />
      </>
    ),
  };
}

const NOTHING: SweepReading = { atSec: 0, controlV: Number.NaN, gateSourceV: Number.NaN, gateLowV: Number.NaN, gateHighV: Number.NaN };

/** In the order in which the frame shows it; one row without numbers while nothing has sounded. */
function sweepTable(readings: readonly SweepReading[]): PlotTable {
  const rows = readings.length > 0 ? [...readings].sort((a, b) => (a.atSec % SWEEP_SEC) - (b.atSec % SWEEP_SEC)) : [NOTHING];
  const volts = (name: string, pick: (reading: SweepReading) => number) => ({ name, unit: 'V', values: rows.map(pick), print: gateVolts });
  return {
    x: { name: 'time', unit: 's', values: rows.map(({ atSec }) => atSec % SWEEP_SEC), print: secondsText },
    ys: [
      volts('gate', ({ gateSourceV }) => gateSourceV),
      volts('lowest', ({ gateLowV }) => gateLowV),
      volts('highest', ({ gateHighV }) => gateHighV),
      volts('control', ({ controlV }) => controlV),
    ],
  };
}
