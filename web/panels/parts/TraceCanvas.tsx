import { useEffect, useRef } from 'preact/hooks';
import { createPainter } from '../../draw/frame.ts';
import type { PlotArea } from '../../draw/plotArea.ts';
import { fitCanvas, paintTraces, type Trace } from '../../draw/traces.ts';
import { useBenchView } from '../BenchContext.ts';

/** Lines that move with the sound, at the screen's own pixels: painted with each report, four times a second for those who ask for less motion. */
export function TraceCanvas({
  area,
  traces,
  label,
}: {
  readonly area: PlotArea;
  readonly traces: () => readonly Trace[];
  readonly label: string;
}) {
  const { bench, slowLive } = useBenchView();
  const canvas = useRef<HTMLCanvasElement>(null);
  const latest = useRef({ area, traces });
  latest.current = { area, traces };
  useEffect(() => {
    const element = canvas.current;
    if (element === null) return undefined;
    // Boxes and colours are read when they change and not with each picture, since the page is laid out for every such look.
    let inks = new Map<string, string>();
    const inkOf = (name: string) => {
      const ink = inks.get(name) ?? getComputedStyle(element).getPropertyValue(name);
      inks.set(name, ink);
      return ink;
    };
    let ratio = Number.NaN;
    const painter = createPainter(() => {
      if (ratio !== window.devicePixelRatio) fitCanvas(element);
      ratio = window.devicePixelRatio;
      paintTraces(element, latest.current.area, latest.current.traces(), inkOf);
    });
    const box = new ResizeObserver(() => {
      ratio = Number.NaN;
      painter.dirty();
    });
    box.observe(element);
    const inOtherColours = () => {
      inks = new Map();
      painter.dirty();
    };
    const calm = matchMedia('(prefers-reduced-motion: reduce)').matches;
    const scheme = matchMedia('(prefers-color-scheme: dark)');
    scheme.addEventListener('change', inOtherColours);
    const ends = [(calm ? slowLive : bench.live).subscribe(painter.dirty), bench.sound.subscribe(painter.dirty)];
    return () => {
      for (const end of ends) end();
      scheme.removeEventListener('change', inOtherColours);
      box.disconnect();
      painter.stop();
    };
  }, [bench, slowLive, area.width, area.height]);
  return <canvas ref={canvas} role="img" aria-label={label} />;
}
