import { feedbackFraction } from '../../model/design/feedback.ts';
import { curveAt, type FeedbackPlot, labelSide, leastWords, plotFeedback, thdRangeOf } from '../draw/feedbackPlot.ts';
import type { FeedbackCurve } from '../state/bench.ts';
import { toPixel } from '../draw/scale.ts';
import { gateVolts, percentText } from '../draw/words.ts';
import { useBench, usePlaying, useVariant } from './BenchContext.ts';
import { FeedbackPointer } from './FeedbackPointer.tsx';
import { Figure } from './parts/Figure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { useSheetSize } from './parts/useSheetSize.ts';
import { useHeldRange } from './useHeldRange.ts';

/** Fig. 2: distortion against k at this gate voltage. The axis itself is the control of k. */
export function FeedbackFigure() {
  const bench = useBench();
  const { ref, size } = useSheetSize<HTMLDivElement>();
  const curve = bench.feedbackCurve.value;
  const { cell } = useVariant();
  const drawable = curve !== null && curve.points.length > 1 ? curve : null;
  const range = useHeldRange(drawable && thdRangeOf(drawable.points), usePlaying());
  const plot = size && drawable && range ? plotFeedback(drawable.points, size.width, size.height, range) : null;
  return (
    <Figure
      number={2}
      className="feedback-figure"
      caption={
        <>
          Distortion against <i>k</i> (drag it){drawable && <>, gate at {gateVolts(drawable.gateV)}</>}. Shaded: 1{'\u2009'}% parts.
        </>
      }
    >
      <div class="plot" ref={ref}>
        {plot && drawable && <Curves plot={plot} curve={drawable} />}
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
}

function Curves({ plot, curve }: CurvesProps) {
  const { area, least, h2Label, h3Label } = plot;
  const pointer = toPixel(plot.x, feedbackFraction(useVariant().cell));
  const xTicks = plot.xTicks.map((tick) => (Math.abs(tick.at - pointer) < 24 ? { ...tick, words: null } : tick));
  return (
    <svg viewBox={`0 0 ${area.width} ${area.height}`} role="img" aria-label={`Distortion against k: ${leastWords(least)}`}>
      <PlotFrame area={area} xTicks={xTicks} yTicks={plot.yTicks} under={3} />
      <clipPath id="feedback-clip">
        <rect x={area.left} y={area.top} width={area.right - area.left} height={area.bottom - area.top} />
      </clipPath>
      <g clip-path="url(#feedback-clip)">
        <path class="band" d={plot.band} />
        <path class="curve-h2-under" d={plot.h2} />
        <path class="now-line curve-thd" d={plot.thd} />
        <path class="curve-h2" d={plot.h2} />
        <path class="curve-h3" d={plot.h3} />
      </g>
      <Present plot={plot} curve={curve} />
      {h2Label && (
        <text class="note-text halo" x={h2Label.x + 12} y={h2Label.y + 16}>
          <tspan class="italic">H</tspan>
          <tspan class="subscript" dy={3}>
            2
          </tspan>
          <tspan dy={-3}>, even</tspan>
        </text>
      )}
      {h3Label && (
        <text class="note-text halo" x={h3Label.x + 4} y={h3Label.y - 8}>
          <tspan class="italic">H</tspan>
          <tspan class="subscript" dy={3}>
            3
          </tspan>
          <tspan dy={-3}>, odd</tspan>
        </text>
      )}
      <text class="note-text halo" x={Math.min(least.x + 14, area.right - 128)} y={area.bottom - 8}>
        {leastWords(least)}
      </text>
    </svg>
  );
}

/** The point at the k of now, on the curve, and a line down to the pointer. */
function Present({ plot, curve }: CurvesProps) {
  const playing = usePlaying();
  const now = curveAt(curve.points, feedbackFraction(useVariant().cell));
  if (now === null) return null;
  const { area, x: scale, y } = plot;
  const x = toPixel(scale, now.k);
  const height = Math.min(area.bottom, Math.max(area.top, toPixel(y, now.thd)));
  const toLeft = labelSide(plot, { x, y: height }) === 'left';
  const labelY = height - 6 < area.top + 10 ? height + 18 : Math.min(height - 6, area.bottom - 24);
  return (
    <g>
      <path class="now-line thin" d={`M${x} ${height}V${area.bottom}`} />
      <circle class={playing ? 'present' : 'present hollow'} cx={x} cy={height} r={4.5} />
      <text class="note-text halo now-text" x={toLeft ? x - 10 : x + 10} y={labelY} text-anchor={toLeft ? 'end' : 'start'}>
        {playing ? 'now' : `THD ${percentText(now.thd)}\u2009%`}
      </text>
    </g>
  );
}
