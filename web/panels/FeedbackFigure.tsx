import { useMemo } from 'preact/hooks';
import { feedbackFraction } from '../../model/design/feedback.ts';
import { curveAt, type FeedbackPlot, leastWords, plotFeedback, thdRangeOf } from '../draw/feedbackPlot.ts';
import { placeLabels } from '../draw/curveLabels.ts';
import type { Point } from '../draw/line.ts';
import type { PlotTable } from '../draw/plotData.ts';
import { remembered } from '../draw/remembered.ts';
import type { FeedbackCurve, FeedbackPoint } from '../state/bench.ts';
import { toPixel } from '../draw/scale.ts';
import { decimals, gateVolts, percentText, signedPercentText } from '../draw/words.ts';
import { useBench, usePlaying, useReading, useVariant } from './BenchContext.ts';
import { FeedbackPointer } from './FeedbackPointer.tsx';
import { Clip } from './parts/Clip.tsx';
import { type Drawing, PlotFigure } from './parts/PlotFigure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { useHeldRange } from './useHeldRange.ts';

/** A curve of a gate voltage this near is that of the moment: both are printed to 10 mV. */
const SAME_GATE_V = 0.011;

/** Fig. 2: distortion against k at this gate voltage. The axis itself is the control of k. */
export function FeedbackFigure() {
  const bench = useBench();
  const curve = bench.feedbackCurve.value;
  const { cell } = useVariant();
  const drawable = curve !== null && curve.points.length > 1 ? curve : null;
  const vgsV = useReading()?.vgsV ?? null;
  const current = drawable === null || vgsV === null || Math.abs(drawable.gateV - vgsV) < SAME_GATE_V;
  const plotOf = useMemo(() => remembered(plotCurve), []);
  const range = useHeldRange(drawable && thdRangeOf(drawable.points), usePlaying());
  const drawn = (width: number, height: number): Drawing | null => {
    if (drawable === null || range === null) return null;
    const plot = plotOf(drawable, width, height, range.from, range.to);
    const picture = (
      <>
        <Curves plot={plot} curve={drawable} current={current} />
        <FeedbackPointer plot={plot} />
      </>
    );
    return { area: plot.area, x: plot.x, tables: () => curveTables(drawable), picture };
  };
  return (
    <PlotFigure
      number={2}
      className="feedback-figure"
      title="Distortion against k"
      caption={
        <>
          Distortion against <i>k</i>
          {drawable && (
            <>
              {' '}
              (drag it), gate at {gateVolts(drawable.gateV)}
              {current ? '' : ' a moment ago'}. Shaded: 1{'\u2009'}% parts.
            </>
          )}
        </>
      }
      draw={drawn}
      empty={<p class="unread empty-plot">{cell.feedback.kind === 'none' ? 'no feedback is fitted, so k stays 0' : 'no reading yet'}</p>}
    />
  );
}

function plotCurve({ points }: FeedbackCurve, width: number, height: number, from: number, to: number): FeedbackPlot {
  return plotFeedback(points, width, height, { from, to });
}

/** Per cent of the fundamental; the sign of H2 says which way to turn k. */
function curveTables({ points }: FeedbackCurve): PlotTable[] {
  const percent = (name: string, pick: (point: FeedbackPoint) => number, print = percentText) => ({
    name,
    unit: '%',
    values: points.map((point) => 100 * pick(point)),
    print: (value: number) => `${print(value / 100)}\u2009%`,
  });
  return [
    {
      x: { name: 'k', unit: '', values: points.map(({ k }) => k), print: (k) => `k ${decimals(k, 3)}` },
      ys: [percent('THD', ({ thd }) => thd), percent('H2', ({ h2Signed }) => h2Signed, signedPercentText), percent('H3', ({ h3 }) => h3)],
    },
  ];
}

interface CurvesProps {
  readonly plot: FeedbackPlot;
  readonly curve: FeedbackCurve;
  readonly current: boolean;
}

/** What a letter takes of the labels' size, sheet pixels. */
const LETTER = 5.8;

function Curves({ plot, curve, current }: CurvesProps) {
  const { area, least } = plot;
  const k = feedbackFraction(useVariant().cell);
  const playing = usePlaying();
  const thd = useReading()?.thdFundamental ?? curveAt(curve.points, k)?.thd ?? null;
  const pointer = toPixel(plot.x, k);
  const present = thd === null ? null : { x: pointer, y: Math.min(area.bottom, Math.max(area.top, toPixel(plot.y, thd))) };
  const nowWords = playing || thd === null ? 'now' : `THD ${percentText(thd)}\u2009%`;
  const still = useMemo(() => <Still plot={plot} pointer={pointer} current={current} />, [plot, pointer, current]);
  const labels = placeLabels(plot, present, { now: LETTER * nowWords.length, least: LETTER * leastWords(least).length, harmonic: 48 });
  return (
    <svg viewBox={`0 0 ${area.width} ${area.height}`} role="img" aria-label={`Distortion against k: ${leastWords(least)}`}>
      {still}
      {present && (
        <g>
          <path class="now-line thin" d={`M${present.x} ${present.y}V${area.bottom}`} />
          <circle class={playing ? 'present' : 'present hollow'} cx={present.x} cy={present.y} r={4.5} />
        </g>
      )}
      {labels.now && (
        <text class="note-text halo now-text" x={labels.now.x} y={labels.now.y}>
          {nowWords}
        </text>
      )}
      {labels.h2 && <HarmonicLabel place={labels.h2} n={2} words="even" />}
      {labels.h3 && <HarmonicLabel place={labels.h3} n={3} words="odd" />}
      <text class="note-text halo" x={labels.least.x} y={labels.least.y}>
        {leastWords(least)}
      </text>
    </svg>
  );
}

/** What stays while only the point of now moves. */
function Still({ plot, pointer, current }: { readonly plot: FeedbackPlot; readonly pointer: number; readonly current: boolean }) {
  const { area } = plot;
  const xTicks = plot.xTicks.map((tick) => (Math.abs(tick.at - pointer) < 24 ? { ...tick, words: null } : tick));
  return (
    <>
      <PlotFrame area={area} xTicks={xTicks} yTicks={plot.yTicks} under={3} />
      <Clip id="feedback-clip" area={area} {...(!current && { className: 'past' })}>
        <path class="band" d={plot.band} />
        <path class="curve-h2-under" d={plot.h2} />
        <path class="now-line curve-thd" d={plot.thd} />
        <path class="curve-h2" d={plot.h2} />
        <path class="curve-h3" d={plot.h3} />
      </Clip>
    </>
  );
}

function HarmonicLabel({ place, n, words }: { readonly place: Point; readonly n: number; readonly words: string }) {
  return (
    <text class="note-text halo" x={place.x} y={place.y}>
      <tspan class="italic">H</tspan>
      <tspan class="subscript" dy={3}>
        {n}
      </tspan>
      <tspan dy={-3}>, {words}</tspan>
    </text>
  );
}
