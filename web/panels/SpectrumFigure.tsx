import { useEffect, useRef } from 'preact/hooks';
import { createPainter } from '../draw/frame.ts';
import { plotArea } from '../draw/plotArea.ts';
import { linearScale, logScale, toPixel } from '../draw/scale.ts';
import { createSpectrumReader } from '../draw/spectrumSource.ts';
import { drawSpectrum } from '../draw/spectrumCanvas.ts';
import { decimals } from '../draw/words.ts';
import { useBench } from './BenchContext.ts';
import { Figure } from './parts/Figure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { useSheetSize } from './parts/useSheetSize.ts';

const MARGINS = { left: 46, right: 10, top: 8, bottom: 24 };
const LOWEST_DB = -120;
const HZ = [20, 100, 1000, 10000] as const;
/** A new picture at most this often; a quarter as often for those who ask for less motion. */
const EVERY_MS = 66;

/** Fig. 4: the spectrum of what goes in and of what comes out. */
export function SpectrumFigure() {
  const { ref, size } = useSheetSize<HTMLDivElement>();
  const silent = useBench().sound.value === 'idle';
  return (
    <Figure number={4} className="spectrum-figure" caption="Spectrum, in (grey) and out; 0 dB is a sine at full scale.">
      <div class="plot" ref={ref}>
        {size && <Frame {...size} />}
        {size && <Traces key={`${size.width} ${size.height}`} {...size} />}
        {silent && <p class="aside plot-word">no sound yet</p>}
      </div>
    </Figure>
  );
}

function scales(width: number, height: number) {
  const area = plotArea(width, height, MARGINS);
  return { area, x: logScale(20, 20000, area.left, area.right), y: linearScale(LOWEST_DB, 0, area.bottom, area.top) };
}

function Frame({ width, height }: { readonly width: number; readonly height: number }) {
  const { area, x, y } = scales(width, height);
  const xTicks = HZ.map((hz) => ({ at: toPixel(x, hz), words: hz >= 1000 ? `${hz / 1000}\u2009k` : String(hz) }));
  const yTicks = [0, -30, -60, -90].map((db) => ({ at: toPixel(y, db), words: db === 0 ? '0\u2009dB' : decimals(db, 0) }));
  return (
    <svg viewBox={`0 0 ${width} ${height}`} aria-hidden="true">
      <PlotFrame area={area} xTicks={xTicks} yTicks={yTicks} />
      <text class="axis-text" x={area.right} y={area.bottom + 15} text-anchor="end">
        Hz
      </text>
    </svg>
  );
}

/** The traces, on a canvas at the screen's own pixels. */
function Traces({ width, height }: { readonly width: number; readonly height: number }) {
  const bench = useBench();
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const element = canvas.current;
    if (element === null) return undefined;
    const readInput = createSpectrumReader(bench.inputSamples);
    const readOutput = createSpectrumReader(bench.outputSamples);
    const calm = matchMedia('(prefers-reduced-motion: reduce)');
    let last = 0;
    const painter = createPainter(() => {
      last = performance.now();
      const rateHz = bench.spectrumRateHz.peek();
      drawSpectrum(element, scales(width, height), {
        before: readInput(rateHz),
        after: readOutput(rateHz),
      });
    });
    const unsubscribe = bench.live.subscribe((live) => {
      const wait = calm.matches ? 250 : EVERY_MS;
      if (live !== null && performance.now() - last >= wait) painter.dirty();
    });
    const scheme = matchMedia('(prefers-color-scheme: dark)');
    scheme.addEventListener('change', painter.dirty);
    const unsubscribeSound = bench.sound.subscribe(painter.dirty);
    return () => {
      unsubscribe();
      unsubscribeSound();
      scheme.removeEventListener('change', painter.dirty);
      painter.stop();
    };
  }, [bench, width, height]);
  return <canvas ref={canvas} role="img" aria-label="Spectrum of the input and of the output" />;
}
