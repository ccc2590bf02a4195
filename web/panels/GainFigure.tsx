import { useLayoutEffect, useRef } from 'preact/hooks';
import { gainAt, type GainPlot, plotGain } from '../draw/gainPlot.ts';
import type { PlotTable } from '../draw/plotData.ts';
import { toPixel } from '../draw/scale.ts';
import { decimals, gateVolts } from '../draw/words.ts';
import type { WorstReading } from '../state/bench.ts';
import { useBench, usePlaying, useReading } from './BenchContext.ts';
import { Clip } from './parts/Clip.tsx';
import { type Drawing, PlotFigure } from './parts/PlotFigure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { useSlowWords } from './parts/useSlowWords.ts';
import { setAll } from './parts/setAll.ts';
import { glided, useGlide } from './parts/useGlide.ts';
import { overLimit, useThdLimit } from './sheetLimits.ts';

/** Fig. 5: gain against the gate's voltage, what of it the swing reaches, and where distortion is worst. */
export function GainFigure() {
  const bench = useBench();
  const swing = bench.swing.value;
  const beyond = bench.beyond.value ?? [];
  const worst = bench.worst.value;
  const drawn = (width: number, height: number): Drawing | null => {
    if (swing === null || swing.length === 0) return null;
    const plot = plotGain(swing, beyond, worst, width, height);
    return { area: plot.area, x: plot.x, tables: () => gainTables(plot), picture: <Picture plot={plot} worst={worst} /> };
  };
  return (
    <PlotFigure
      number={5}
      className="gain-figure"
      title="Gain against gate voltage"
      caption="Gain against gate voltage."
      draw={drawn}
      empty={<p class="unread empty-plot">no reading{bench.period.value === null && ' yet'}</p>}
    />
  );
}

const decibels = (db: number) => `${decimals(db, 1)}\u2009dB`;

function gainTables({ curve }: GainPlot): PlotTable[] {
  return [
    {
      x: { name: 'gate', unit: 'V', values: curve.map(({ gateV }) => gateV), print: (volts) => `gate ${gateVolts(volts)}` },
      ys: [{ name: 'gain', unit: 'dB', values: curve.map(({ gainDb }) => gainDb), print: decibels }],
    },
  ];
}

function Picture({ plot, worst }: { readonly plot: GainPlot; readonly worst: WorstReading | null }) {
  const { area, swing } = plot;
  const [left, right] = swing;
  const ruler = area.bottom - 10;
  const words = worst ? `worst over the swing at ${gateVolts(worst.gateV)}` : '';
  return (
    <svg viewBox={`0 0 ${area.width} ${area.height}`} role="img" aria-label={`Gain against gate voltage; ${words}`}>
      <PlotFrame area={area} xTicks={plot.xTicks} yTicks={plot.yTicks} />
      <Clip id="gain-clip" area={area}>
        <path class="curve" d={plot.whole} />
        <path class="now-line" d={plot.reached} />
      </Clip>
      {right - left > 2 && (
        <>
          <path class="dimension" d={`M${left} ${ruler}H${right}M${left} ${ruler - 4}v8M${right} ${ruler - 4}v8`} />
          <text class="note-text halo" x={(left + right) / 2} y={ruler - 5} text-anchor="middle">
            swing
          </text>
        </>
      )}
      {plot.worst && worst && <Worst plot={plot} worst={worst} />}
      <Present plot={plot} />
    </svg>
  );
}

/** A cross, in the colour of a limit only where one is passed. */
function Worst({ plot, worst }: { readonly plot: GainPlot; readonly worst: WorstReading }) {
  const over = overLimit(worst.thdFundamental, useThdLimit().value);
  const { area } = plot;
  const { x, y } = plot.worst ?? { x: area.left, y: area.top };
  const onLeft = x > (area.left + area.right) / 2;
  const low = Math.min(area.bottom - 20, Math.max(area.top + 14, y + (y < area.top + 14 ? 4 : 0)));
  return (
    <g class={over ? 'mark past-limit' : 'mark'}>
      <path d={`M${x - 4.5} ${y - 4.5}l9 9m0-9l-9 9`} />
      <text class="note-text halo" x={onLeft ? x - 10 : x + 10} y={low} text-anchor={onLeft ? 'end' : 'start'}>
        worst THD, at {decimals(worst.gainDb, 1)}
        {'\u2009'}dB
      </text>
    </g>
  );
}

/** The point on the curve glides with the gate, outside rendering, and its words with it. */
function Present({ plot }: { readonly plot: GainPlot }) {
  const playing = usePlaying();
  /** Where the moment's reading was made, for a point that stands. */
  const gateV = useReading()?.vgsV ?? null;
  const point = useRef<SVGCircleElement>(null);
  const words = useRef<SVGTextElement>(null);
  const say = useSlowWords(decibels);
  const { area, x, y, curve } = plot;
  const put = (volts: number) => {
    const gain = gainAt(curve, volts);
    if (gain === null) return;
    const [across, down] = [toPixel(x, volts), Math.min(area.bottom, toPixel(y, gain))];
    const onLeft = across > area.right - 70;
    setAll(point.current, { cx: across, cy: down });
    const height = Math.min(area.bottom - 24, Math.max(area.top + 28, down + 4));
    say(words.current, gain);
    setAll(words.current, { x: onLeft ? across - 9 : across + 9, y: height, 'text-anchor': onLeft ? 'end' : 'start' });
  };
  useGlide((at) => put(glided(at, ({ gateSourceV }) => gateSourceV)));
  useLayoutEffect(() => {
    if (!playing && gateV !== null) put(gateV);
  });
  if (gateV === null) return null;
  return (
    <>
      <circle ref={point} class={playing ? 'present' : 'present hollow'} r={4.5} />
      <text ref={words} class="note-text halo now-text" />
    </>
  );
}
