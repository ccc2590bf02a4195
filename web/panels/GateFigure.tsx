import { useEffect, useMemo, useRef } from 'preact/hooks';
import type { ControlPicture, LiveLevels } from '../state/bench.ts';
import { type GatePlot, isFollower, plotGate, type Region, turnOf } from '../draw/gatePlot.ts';
import { toPixel } from '../draw/scale.ts';
import { valueVolts, voltsText } from '../draw/words.ts';
import { useBench, useBenchView, usePlaying } from './BenchContext.ts';
import { Figure } from './parts/Figure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { useSheetSize } from './parts/useSheetSize.ts';

/** Fig. 3: the gate over one period of the control, with its regions in a strip below. */
export function GateFigure() {
  const { ref, size } = useSheetSize<HTMLDivElement>();
  const found = useBench().period.value;
  const period = found === null || 'fault' in found ? null : found;
  const plot = useMemo(() => (size && period ? plotGate(period, size.width, size.height) : null), [period, size]);
  const caption =
    plot && period && `${subject(period)}, ${pastWords(plot.deepest.pastV)}. Strip: filled ohmic, empty off, hatched conducting.`;
  return (
    <Figure number={3} className="gate-figure" caption={caption}>
      <div class="plot" ref={ref}>
        {plot && period && <Drawn plot={plot} period={period} />}
        {found !== null && 'fault' in found && <p class="unread empty-plot">{found.fault}</p>}
      </div>
    </Figure>
  );
}

interface DrawnProps {
  readonly plot: GatePlot;
  readonly period: ControlPicture;
}

function subject(period: ControlPicture): string {
  if (isFollower(period)) return 'Gate against the level of a steady tone';
  return period.steady ? 'Gate at a fixed control' : 'Gate over a period';
}

function Drawn({ plot, period }: DrawnProps) {
  const { gateOffV } = period;
  const { area, offY, offArea, deepest } = plot;
  const roomy = deepest.pastV > 0 && Math.abs(deepest.y - offY) >= 12;
  const arrowX = Math.max(area.left + 6, Math.min(area.right - 6, deepest.x));
  const labelLeft = deepest.x > (area.left + area.right) / 2;
  return (
    <svg
      viewBox={`0 0 ${area.width} ${area.height}`}
      role="img"
      aria-label={`${subject(period)}, against VGS(off) ${valueVolts(gateOffV)}`}
    >
      <defs>
        <pattern id="off-hatch" width="6" height="6" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path class="hatch" d="M0 0V6" />
        </pattern>
        <pattern id="on-hatch" width="4" height="4" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <path class="hatch strong" d="M0 0V4" />
        </pattern>
      </defs>
      <PlotFrame area={area} xTicks={plot.xTicks} yTicks={plot.yTicks} under={11} />
      <rect x={area.left} y={offArea.top} width={area.right - area.left} height={Math.max(0, offArea.height)} fill="url(#off-hatch)" />
      <path class="dash-dot" d={`M${area.left} ${offY}H${area.right}`} />
      <path class="now-line" d={plot.gate} />
      <text
        class="note-text halo"
        x={labelLeft ? area.left + 7 : area.right - 7}
        y={plot.labelAbove ? offY - 6 : offY + 13}
        text-anchor={labelLeft ? 'start' : 'end'}
      >
        <tspan class="italic">V</tspan>
        <tspan class="subscript" dy={3}>
          GS(off)
        </tspan>
      </text>
      {roomy && (
        <path
          class="dimension"
          d={`M${arrowX} ${offY}V${deepest.y}m-3 ${deepest.y > offY ? -6 : 6}l3 ${deepest.y > offY ? 6 : -6}l3 ${deepest.y > offY ? -6 : 6}`}
        />
      )}
      <Strip plot={plot} />
      <Present plot={plot} period={period} />
    </svg>
  );
}

/** How far the deepest end of the swing lies past VGS(off). */
function pastWords(pastV: number): string {
  return pastV > 0 ? `past off by ${voltsText(pastV)} at its deepest` : `${voltsText(-pastV)} short of off`;
}

function Strip({ plot }: { readonly plot: GatePlot }) {
  const y = plot.area.bottom + 4;
  return (
    <g class="strip">
      {plot.regions.map(({ region, from, to }) => (
        <rect key={from} {...paintOf(region)} x={from} y={y} width={to - from} height={7} />
      ))}
      <rect class="border" x={plot.area.left} y={y} width={plot.area.right - plot.area.left} height={7} />
    </g>
  );
}

function paintOf(region: Region): { class: string } | { fill: string } {
  return region === 'conducting' ? { fill: 'url(#on-hatch)' } : { class: `region-${region}` };
}

/** The point of this moment: moved at frame rate, outside rendering. */
function Present({ plot, period }: DrawnProps) {
  const { bench, slowLive } = useBenchView();
  const playing = usePlaying();
  const point = useRef<SVGCircleElement>(null);
  useEffect(() => {
    let before = 0;
    const source = matchMedia('(prefers-reduced-motion: reduce)').matches ? slowLive : bench.live;
    return source.subscribe((live) => {
      if (live === null || point.current === null) return;
      const { y, area } = plot;
      const across = placeAcross(plot, period, live, live.controlV < before);
      before = live.controlV;
      const height = Math.max(area.top, Math.min(area.bottom, toPixel(y, live.gateSourceV)));
      point.current.setAttribute('cx', String(across));
      point.current.setAttribute('cy', String(height));
    });
  }, [bench, slowLive, plot, period]);
  return <circle ref={point} class={playing ? 'present' : 'present hollow'} cx={plot.start.x} cy={plot.start.y} r={4.5} />;
}

function placeAcross({ area, x }: GatePlot, period: ControlPicture, live: LiveLevels, falling: boolean): number {
  if (isFollower(period)) return Math.max(area.left, Math.min(area.right, toPixel(x, live.inputPeakV)));
  if (period.steady) return (area.left + area.right) / 2;
  return x.start + turnOf(period, live.controlV, falling) * (x.end - x.start);
}
