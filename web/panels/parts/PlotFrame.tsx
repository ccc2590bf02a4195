import type { PlotArea, Tick } from '../../draw/plotArea.ts';

interface PlotFrameProps {
  readonly area: PlotArea;
  readonly xTicks: readonly Tick[];
  readonly yTicks: readonly Tick[];
  /** Room between the frame and the numbers under it, for a strip. */
  readonly under?: number;
}

const TICK = 4;

/** Grid, full frame, inward ticks and numbers of a figure. The grid lies under what is drawn after it. */
export function PlotFrame({ area, xTicks, yTicks, under = 0 }: PlotFrameProps) {
  const { left, right, top, bottom } = area;
  const inner = (ticks: readonly Tick[], from: number, to: number) =>
    ticks.filter(({ at }) => at > Math.min(from, to) + 1 && at < Math.max(from, to) - 1);
  const across = inner(xTicks, left, right);
  const up = inner(yTicks, top, bottom);
  return (
    <g class="frame">
      <path
        class="grid"
        d={across.map(({ at }) => `M${at} ${top}V${bottom}`).join('') + up.map(({ at }) => `M${left} ${at}H${right}`).join('')}
      />
      <path
        class="ticks"
        d={
          across.map(({ at }) => `M${at} ${bottom}v${-TICK}M${at} ${top}v${TICK}`).join('') +
          up.map(({ at }) => `M${left} ${at}h${TICK}M${right} ${at}h${-TICK}`).join('')
        }
      />
      <rect x={left} y={top} width={right - left} height={bottom - top} class="border" />
      {xTicks.map(({ at, words }) => (
        <text key={at} class="axis-text" x={at} y={bottom + under + 15} text-anchor="middle">
          {words}
        </text>
      ))}
      {yTicks.map(({ at, words }) => (
        <text key={at} class="axis-text" x={left - 6} y={at + 3.5} text-anchor="end">
          {words}
        </text>
      ))}
    </g>
  );
}
