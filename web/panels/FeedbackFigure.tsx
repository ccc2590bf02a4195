import { feedbackFraction } from '../../model/design/feedback.ts';
import { curveAt, type FeedbackPlot, leastWords, plotFeedback, thdRangeOf } from '../draw/feedbackPlot.ts';
import { placeLabels } from '../draw/curveLabels.ts';
import type { Point } from '../draw/line.ts';
import type { FeedbackCurve } from '../state/bench.ts';
import { toPixel } from '../draw/scale.ts';
import { gateVolts, percentText } from '../draw/words.ts';
import { useBench, usePlaying, useReading, useVariant } from './BenchContext.ts';
import { FeedbackPointer } from './FeedbackPointer.tsx';
import { Figure } from './parts/Figure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { useSheetSize } from './parts/useSheetSize.ts';
import { useHeldRange } from './useHeldRange.ts';

/** A curve of a gate voltage this near is that of the moment: both are printed to 10 mV. */
const SAME_GATE_V = 0.011;

/** Fig. 2: distortion against k at this gate voltage. The axis itself is the control of k. */
export function FeedbackFigure() {
  const bench = useBench();
  const { ref, size } = useSheetSize<HTMLDivElement>();
  const curve = bench.feedbackCurve.value;
  const { cell } = useVariant();
  const drawable = curve !== null && curve.points.length > 1 ? curve : null;
  const vgsV = useReading()?.vgsV ?? null;
  const current = drawable === null || vgsV === null || Math.abs(drawable.gateV - vgsV) < SAME_GATE_V;
  const range = useHeldRange(drawable && thdRangeOf(drawable.points), usePlaying());
  const plot = size && drawable && range ? plotFeedback(drawable.points, size.width, size.height, range) : null;
  return (
    <Figure
      number={2}
      className="feedback-figure"
      caption={
        <>
          Distortion against <i>k</i> (drag it){drawable && <>, gate at {gateVolts(drawable.gateV)}</>}
          {current ? <>. Shaded: 1{'\u2009'}% parts.</> : ' a moment ago.'}
        </>
      }
    >
      <div class="plot" ref={ref}>
        {plot && drawable && <Curves plot={plot} curve={drawable} current={current} />}
        {plot && <FeedbackPointer plot={plot} />}
        {!plot && (
          <p class="unread empty-plot">{cell.feedback.kind === 'none' ? 'no feedback is fitted, so k stays 0' : 'no reading yet'}</p>
        )}
      </div>
    </Figure>
  );
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
  const xTicks = plot.xTicks.map((tick) => (Math.abs(tick.at - pointer) < 24 ? { ...tick, words: null } : tick));
  const present = thd === null ? null : { x: pointer, y: Math.min(area.bottom, Math.max(area.top, toPixel(plot.y, thd))) };
  const nowWords = playing || thd === null ? 'now' : `THD ${percentText(thd)}\u2009%`;
  const labels = placeLabels(plot, present, { now: LETTER * nowWords.length, least: LETTER * leastWords(least).length, harmonic: 48 });
  return (
    <svg viewBox={`0 0 ${area.width} ${area.height}`} role="img" aria-label={`Distortion against k: ${leastWords(least)}`}>
      <PlotFrame area={area} xTicks={xTicks} yTicks={plot.yTicks} under={3} />
      <clipPath id="feedback-clip">
        <rect x={area.left} y={area.top} width={area.right - area.left} height={area.bottom - area.top} />
      </clipPath>
      <g clip-path="url(#feedback-clip)" class={current ? undefined : 'past'}>
        <path class="band" d={plot.band} />
        <path class="curve-h2-under" d={plot.h2} />
        <path class="now-line curve-thd" d={plot.thd} />
        <path class="curve-h2" d={plot.h2} />
        <path class="curve-h3" d={plot.h3} />
      </g>
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
