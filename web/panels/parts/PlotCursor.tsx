import type { ReadonlySignal, Signal } from '@preact/signals';
import { type PlotTable, rowAt, stepFrom } from '../../draw/plotData.ts';
import { type Scale, toPixel, toValue } from '../../draw/scale.ts';
import type { Drawing } from './PlotFigure.tsx';
import { rem } from './useSheetSize.ts';

interface PlotCursorProps {
  readonly drawing: Drawing;
  readonly title: string;
  /** Its pixel, or null while nobody reads. */
  readonly at: Signal<number | null>;
  readonly words: ReadonlySignal<string | null>;
}

/** Share of the frame's width that an arrow key and a page key move by. */
const STEP = 0.01;
const PAGE = 0.1;

/** The line at which a figure is read, moved by the pointer or, once it has the focus, by the keyboard. */
export function PlotCursor({ drawing, title, at, words }: PlotCursorProps) {
  const { area, x, tables } = drawing;
  const width = area.right - area.left;
  const pixel = at.value ?? (area.left + area.right) / 2;
  // Numbers are only gathered while somebody reads: a spectrum takes two transforms.
  const value = at.value === null ? toValue(x, pixel) : valueAt(tables()[0], x, pixel);
  const across = Math.max(area.left, Math.min(area.right, toPixel(x, value)));
  const onKeyDown = (event: KeyboardEvent) => {
    const steps: Record<string, number> = {
      ArrowRight: STEP,
      ArrowUp: STEP,
      ArrowLeft: -STEP,
      ArrowDown: -STEP,
      PageUp: PAGE,
      PageDown: -PAGE,
    };
    const step = steps[event.key];
    if (event.key === 'Escape') at.value = null;
    else if (event.key === 'Home') at.value = area.left;
    else if (event.key === 'End') at.value = area.right;
    else if (step !== undefined) at.value = Math.max(area.left, Math.min(area.right, stepFrom(tables()[0], x, pixel, step * width)));
    else return;
    event.preventDefault();
  };
  return (
    <div
      class="plot-cursor"
      role="slider"
      tabIndex={0}
      aria-label={`Cursor on ${title}`}
      aria-valuemin={x.from}
      aria-valuemax={x.to}
      aria-valuenow={value}
      aria-valuetext={words.value ?? 'not reading; an arrow key moves it'}
      style={{ left: rem(area.left), top: rem(area.top), width: rem(width), height: rem(area.bottom - area.top) }}
      onFocus={() => {
        at.value ??= pixel;
      }}
      onBlur={() => {
        at.value = null;
      }}
      onKeyDown={onKeyDown}
    >
      {at.value !== null && <i class="cursor-line" style={{ left: rem(across - area.left) }} />}
    </div>
  );
}

function valueAt(table: PlotTable, x: Scale, pixel: number): number {
  return table.x.values[rowAt(table, x, pixel)];
}
