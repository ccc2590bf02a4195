import { useRef } from 'preact/hooks';
import { type GatePlot, isFollower, onPeriod, type Region } from '../draw/gatePlot.ts';
import type { Point } from '../draw/line.ts';
import { toPixel } from '../draw/scale.ts';
import { gateVolts, valueVolts, voltsText } from '../draw/words.ts';
import type { ControlPicture } from '../state/bench.ts';
import { usePlaying } from './BenchContext.ts';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { setAll } from './parts/setAll.ts';
import { useSlowWords } from './parts/useSlowWords.ts';
import { type Glide, glided, useGlide } from './parts/useGlide.ts';

interface GatePictureProps {
  readonly plot: GatePlot;
  readonly picture: ControlPicture;
  /** Over time instead of over the control. */
  readonly sweepSec?: number;
}

/** The frame of Fig. 3 with VGS(off), the off-state margin, the curve and the present point. */
export function GatePicture({ plot, picture, sweepSec }: GatePictureProps) {
  const { gateOffV } = picture;
  const { area, offY, offArea } = plot;
  const labelLeft = plot.deepest.x > (area.left + area.right) / 2;
  // The off region has to hold the margin's words as well.
  const above = offArea.height < TWO_LINES ? gateOffV < 0 : plot.labelAbove;

  return (
    <svg
      viewBox={`0 0 ${area.width} ${area.height}`}
      role="img"
      aria-label={`Gate voltage against VGS(off), ${valueVolts(gateOffV)}; ${pastWords(plot.deepest.pastV)}`}
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
        y={above ? offY - 6 : offY + 13}
        text-anchor={labelLeft ? 'start' : 'end'}
      >
        <tspan class="italic">V</tspan>
        <tspan class="subscript" dy={3}>
          GS(off)
        </tspan>
      </text>
      <Margin plot={plot} />
      {plot.regions.length > 0 && <Strip plot={plot} />}
      <Present plot={plot} picture={picture} {...(sweepSec !== undefined && { sweepSec })} />
    </svg>
  );
}

/** How far the deepest end of the swing lies past VGS(off). */
function pastWords(pastV: number): string {
  return pastV > 0 ? `past off by ${voltsText(pastV)}` : `${voltsText(-pastV)} short of off`;
}

/** Least height that a dimension line can be drawn in, the width of its words, and the height of two lines of words. */
const LEAST_DIMENSION = 12;
const WORDS = 104;
const TWO_LINES = 32;

/** The off-state margin as a dimension, with its words where there is room beside it. */
function Margin({ plot }: { readonly plot: GatePlot }) {
  const { area, offY, deepest } = plot;
  const x = Math.max(area.left + 6, Math.min(area.right - 6, deepest.x));
  const down = offY > (area.top + area.bottom) / 2;
  const roomy = deepest.pastV > 0 && Math.abs(deepest.y - offY) >= LEAST_DIMENSION;
  const tip = deepest.y > offY ? 6 : -6;
  const onLeft = x + 8 + WORDS > area.right;
  const y = down ? area.bottom - 5 : area.top + 12;
  return (
    <>
      {roomy && <path class="dimension" d={`M${x} ${offY}V${deepest.y}m-3 ${-tip}l3 ${tip}l3 ${-tip}`} />}
      <text class="note-text halo" x={onLeft ? x - 8 : x + 8} y={y} text-anchor={onLeft ? 'end' : 'start'}>
        {pastWords(deepest.pastV)}
      </text>
    </>
  );
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

/** The point of this moment glides with the gate, outside rendering, and its words with it. */
function Present({ plot, picture, sweepSec }: GatePictureProps) {
  const playing = usePlaying();
  const point = useRef<SVGCircleElement>(null);
  const words = useRef<SVGTextElement>(null);
  const sayGate = useSlowWords(gateVolts);
  const { area } = plot;
  useGlide((at) => {
    const placed = sweepSec === undefined ? placeOn(plot, picture, at) : sweptTo(plot, at, sweepSec);
    const across = Math.max(area.left, Math.min(area.right, placed.x));
    const height = Math.max(area.top, Math.min(area.bottom, placed.y));
    const onLeft = across > area.right - 60;
    setAll(point.current, { cx: across, cy: height });
    sayGate(
      words.current,
      glided(at, ({ gateSourceV }) => gateSourceV),
    );
    setAll(words.current, {
      x: onLeft ? across - 9 : across + 9,
      y: Math.max(area.top + 11, height - 7),
      'text-anchor': onLeft ? 'end' : 'start',
    });
  });
  if (!playing && sweepSec !== undefined) return null;
  return (
    <>
      <circle ref={point} class={playing ? 'present' : 'present hollow'} cx={plot.start.x} cy={plot.start.y} r={4.5} />
      {playing && <text ref={words} class="note-text halo now-text" x={plot.start.x + 9} y={plot.start.y - 7} />}
    </>
  );
}

function sweptTo({ x, y }: GatePlot, at: Glide, sweepSec: number): Point {
  const seconds = performance.now() / 1000;
  return {
    x: toPixel(x, seconds % sweepSec),
    y: toPixel(
      y,
      glided(at, ({ gateSourceV }) => gateSourceV),
    ),
  };
}

function placeOn({ area, x, y }: GatePlot, picture: ControlPicture, at: Glide): Point {
  if (!isFollower(picture) && !picture.steady) {
    const { turn, gateV } = onPeriod(picture, at);
    return { x: toPixel(x, turn * picture.seconds), y: toPixel(y, gateV) };
  }
  const level = toPixel(
    x,
    glided(at, ({ inputPeakV }) => inputPeakV),
  );
  return {
    x: isFollower(picture) ? level : (area.left + area.right) / 2,
    y: toPixel(
      y,
      glided(at, ({ gateSourceV }) => gateSourceV),
    ),
  };
}
