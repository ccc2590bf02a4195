/** Paints the two traces of Fig. 4. */
import type { PlotArea } from './plotArea.ts';
import type { Scale } from './scale.ts';
import { type Spectrum, spectrumColumns } from './spectrumPlot.ts';

interface Axes {
  readonly area: PlotArea;
  readonly x: Scale;
  readonly y: Scale;
}

/** `before` in grey under `after` in the colour of what is measured now. Sheet pixels are scaled to the canvas's own box and the screen's pixels. */
export function drawSpectrum(
  canvas: HTMLCanvasElement,
  axes: Axes,
  spectra: { readonly before: Spectrum; readonly after: Spectrum },
): void {
  const context = canvas.getContext('2d');
  if (context === null) throw new Error('This browser gives no canvas to draw on');
  const { width, height } = canvas.getBoundingClientRect();
  const ratio = window.devicePixelRatio;
  const [pixelsWide, pixelsHigh] = [Math.round(width * ratio), Math.round(height * ratio)];
  if (canvas.width !== pixelsWide || canvas.height !== pixelsHigh) Object.assign(canvas, { width: pixelsWide, height: pixelsHigh });
  const style = getComputedStyle(canvas);
  const { area } = axes;
  context.setTransform(pixelsWide / area.width, 0, 0, pixelsHigh / area.height, 0, 0);
  context.clearRect(0, 0, area.width, area.height);
  context.save();
  context.beginPath();
  context.rect(area.left, area.top, area.right - area.left, area.bottom - area.top);
  context.clip();
  trace(context, axes, spectra.before, style.getPropertyValue('--ink3'), 0.9);
  trace(context, axes, spectra.after, style.getPropertyValue('--now'), 1.5);
  context.restore();
}

function trace(context: CanvasRenderingContext2D, { x, y, area }: Axes, spectrum: Spectrum, colour: string, width: number): void {
  const columns = spectrumColumns(spectrum, x, y);
  context.beginPath();
  for (let n = 0; n < columns.length; n++)
    context.lineTo(x.start + n, Math.min(Number.isNaN(columns[n]) ? area.bottom + 2 : columns[n], area.bottom + 2));
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.lineJoin = 'round';
  context.stroke();
}
