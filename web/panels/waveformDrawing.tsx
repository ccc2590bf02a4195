import type { PlotTable } from '../draw/plotData.ts';
import type { Trace } from '../draw/traces.ts';
import { triggerAt, waveformAxes, waveformPoints } from '../draw/waveformPlot.ts';
import { voltsText } from '../draw/words.ts';
import { formatQuantity } from '../../model/design/values.ts';
import type { Bench } from '../state/bench.ts';
import { PlotFrame } from './parts/PlotFrame.tsx';
import type { Drawing } from './parts/PlotFigure.tsx';
import { TraceCanvas } from './parts/TraceCanvas.tsx';

export interface WaveformView {
  readonly bench: Bench;
  readonly spanSec: number;
  /** The top of the frame. */
  readonly topV: number;
  readonly silent: boolean;
}

/** Beyond the span, for a crossing to be found in: half a period of 20 Hz and more. */
const SEARCH_SEC = 0.06;

/** Fig. 4 as waveforms, in volts at the cell's input and after the amplifier. */
export function waveformDrawing({ bench, spanSec, topV, silent }: WaveformView, width: number, height: number): Drawing {
  const axes = waveformAxes(spanSec, topV, width, height);
  const { area, x, y } = axes;
  const read = () => {
    const rateHz = bench.spectrumRateHz.peek();
    const span = Math.round(spanSec * rateHz);
    const size = span + Math.round(SEARCH_SEC * rateHz);
    const [input, output] = [new Float32Array(size), new Float32Array(size)];
    bench.inputSamples(input);
    bench.outputSamples(output);
    const { fullScaleV } = bench.design.peek();
    const volts = (samples: Float32Array) => samples.map((share) => share * fullScaleV);
    return { input: volts(input), output: volts(output), from: triggerAt(input, span), span, rateHz };
  };
  const traces = (): Trace[] => {
    const { input, output, from, span } = read();
    return [
      { points: waveformPoints(input, from, span, x, y), ink: '--ink3', width: 0.9 },
      { points: waveformPoints(output, from, span, x, y), ink: '--now', width: 1.5 },
    ];
  };
  return {
    area,
    x,
    tables: () => waveformTables(read()),
    traces,
    picture: (
      <>
        <svg viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
          <PlotFrame area={area} xTicks={axes.xTicks} yTicks={axes.yTicks} />
          <path class="axis" d={`M${area.left} ${(area.top + area.bottom) / 2}H${area.right}`} />
        </svg>
        <TraceCanvas area={area} traces={traces} label={`Waveforms of the input and of the output over ${1000 * spanSec} ms`} />
        {silent && <p class="aside plot-word">no sound yet</p>}
      </>
    ),
  };
}

function waveformTables({
  input,
  output,
  from,
  span,
  rateHz,
}: {
  input: Float32Array;
  output: Float32Array;
  from: number;
  span: number;
  rateHz: number;
}): PlotTable[] {
  return [
    {
      x: {
        name: 'time',
        unit: 's',
        values: Float64Array.from({ length: span }, (_, n) => n / rateHz),
        print: (sec) => formatQuantity(sec, 's', 3),
      },
      ys: [
        { name: 'in', unit: 'V', values: input.subarray(from, from + span), print: voltsText },
        { name: 'out', unit: 'V', values: output.subarray(from, from + span), print: voltsText },
      ],
      keeps: 'furthest',
    },
  ];
}
