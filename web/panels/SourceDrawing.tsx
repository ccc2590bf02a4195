import type { PlotArea } from '../draw/plotArea.ts';
import { timeTicks } from '../draw/overview.ts';
import { type Scale, toPixel } from '../draw/scale.ts';
import { voltsText } from '../draw/words.ts';
import type { Region } from '../state/bench.ts';

/** The scale of time and of volts that the source stands in. */
export function Frame({ area, time, peakV }: { readonly area: PlotArea; readonly time: Scale; readonly peakV: number }) {
  const { left, right, top, bottom } = area;
  const middle = (top + bottom) / 2;
  const ticks = timeTicks(time);
  return (
    <>
      <path
        class="axis"
        d={`M${left} ${top}V${bottom}H${right}V${top}M${left} ${middle}h4${ticks.map(({ at }) => `M${at} ${bottom}v-5`).join('')}`}
      />
      <text class="axis-text" x={left - 5} y={middle + 4} text-anchor="end">
        ±{voltsText(peakV)}
      </text>
      {ticks.map(({ at, words }) => (
        <text key={words} class="axis-text" x={at} y={bottom + 14} text-anchor={at > right - 12 ? 'end' : 'middle'}>
          {words}
        </text>
      ))}
    </>
  );
}

/** Heavy brackets at the ends of what loops; what does not is hatched. */
export function Ends({ region, area, time }: { readonly region: Region; readonly area: PlotArea; readonly time: Scale }) {
  const { left, right, top, bottom } = area;
  const [from, to] = [toPixel(time, region.fromSec), toPixel(time, region.toSec)];
  const outside = (x: number, end: number) =>
    end - x > 0.5 && <rect x={x} y={top} width={end - x} height={bottom - top} fill="url(#outside)" />;
  return (
    <>
      <pattern id="outside" width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
        <path class="hatch" d="M0 0V6" />
      </pattern>
      {outside(left, from)}
      {outside(to, right)}
      <path class="bracket" d={`M${from + 6} ${top}H${from}V${bottom}h6M${to - 6} ${top}H${to}V${bottom}h-6`} />
    </>
  );
}
