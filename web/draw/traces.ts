/** Fast lines of a figure: painted on a canvas while they move, written as paths when the picture is saved. */
import { linePath, type Point } from './line.ts';
import type { PlotArea } from './plotArea.ts';

export interface Trace {
  readonly points: readonly Point[];
  /** A colour of the sheet by its name: `--now`. */
  readonly ink: string;
  readonly width: number;
}

/** Gives the canvas the screen's own pixels. Reads its box, so the page is laid out for it: not while it is painted. */
export function fitCanvas(canvas: HTMLCanvasElement): void {
  const { width, height } = canvas.getBoundingClientRect();
  const ratio = window.devicePixelRatio;
  const [pixelsWide, pixelsHigh] = [Math.round(width * ratio), Math.round(height * ratio)];
  if (canvas.width !== pixelsWide || canvas.height !== pixelsHigh) Object.assign(canvas, { width: pixelsWide, height: pixelsHigh });
}

/** Paints within the frame, sheet pixels scaled to those of the canvas, in the colours that `inkOf` gives. */
export function paintTraces(canvas: HTMLCanvasElement, area: PlotArea, traces: readonly Trace[], inkOf: (name: string) => string): void {
  const context = canvas.getContext('2d');
  if (context === null) throw new Error('This browser gives no canvas to draw on');
  context.setTransform(canvas.width / area.width, 0, 0, canvas.height / area.height, 0, 0);
  context.clearRect(0, 0, area.width, area.height);
  context.save();
  context.beginPath();
  context.rect(area.left, area.top, area.right - area.left, area.bottom - area.top);
  context.clip();
  for (const { points, ink, width: lineWidth } of traces) {
    context.beginPath();
    let pen = false;
    for (const { x, y } of points) {
      if (!Number.isFinite(y)) pen = false;
      else if (pen) context.lineTo(x, y);
      else {
        context.moveTo(x, y);
        pen = true;
      }
    }
    context.strokeStyle = inkOf(ink);
    context.lineWidth = lineWidth;
    context.lineJoin = 'round';
    context.stroke();
  }
  context.restore();
}

/** As SVG, in the colours that `inkOf` gives; the clip is the caller's. */
export function traceElements(traces: readonly Trace[], inkOf: (name: string) => string): string {
  return traces
    .map(({ points, ink, width }) => `<path d="${linePath(points)}" fill="none" stroke="${inkOf(ink)}" stroke-width="${width}"/>`)
    .join('');
}
