import { useSignal } from '@preact/signals';
import { useContext, useRef } from 'preact/hooks';
import { feedbackFraction } from '../../model/design/feedback.ts';
import type { FeedbackPlot } from '../draw/feedbackPlot.ts';
import { toPixel, toValue } from '../draw/scale.ts';
import { useBench, useVariant } from './BenchContext.ts';
import { CaptionContext } from './parts/CaptionContext.ts';
import { rem, rootPixels } from './parts/useSheetSize.ts';

const STEP = 0.001;
const PAGE = 0.01;

/** The solid pointer with k in it that stands on the axis: dragged, or moved by the arrow and page keys. */
export function FeedbackPointer({ plot }: { readonly plot: FeedbackPlot }) {
  const bench = useBench();
  const { cell } = useVariant();
  const caption = useContext(CaptionContext);
  const track = useRef<HTMLDivElement>(null);
  const dragging = useSignal(false);
  const k = feedbackFraction(cell);
  const { area, x } = plot;
  if (cell.feedback.kind === 'none') return null;

  const set = (next: number) => {
    const refused = bench.setFeedbackFraction(Number(Math.max(0, Math.min(1, next)).toFixed(4)));
    caption.value = refused === null ? null : { words: refused, refused: true };
  };
  const follow = (event: PointerEvent) => {
    const box = track.current?.getBoundingClientRect();
    if (box === undefined) return;
    const pixel = ((event.clientX - box.left) * 16) / rootPixels() + area.left;
    set(toValue(x, Math.max(area.left, Math.min(area.right, pixel))));
  };
  const onKeyDown = (event: KeyboardEvent) => {
    const moves: Record<string, number> = {
      ArrowRight: k + STEP,
      ArrowUp: k + STEP,
      ArrowLeft: k - STEP,
      ArrowDown: k - STEP,
      PageUp: k + PAGE,
      PageDown: k - PAGE,
      Home: x.from,
      End: x.to,
    };
    const next = moves[event.key];
    if (next === undefined) return;
    event.preventDefault();
    set(next);
  };
  const across = Math.max(area.left, Math.min(area.right, toPixel(x, k)));
  return (
    <div
      ref={track}
      class="k-track"
      style={{ left: rem(area.left), width: rem(area.right - area.left), top: rem(area.top), height: rem(area.height - area.top) }}
      onPointerDown={(event) => {
        if (event.button !== 0) return;
        event.currentTarget.setPointerCapture(event.pointerId);
        dragging.value = true;
        follow(event);
      }}
      onPointerMove={(event) => dragging.value && follow(event)}
      onPointerUp={() => (dragging.value = false)}
      onPointerCancel={() => (dragging.value = false)}
    >
      <div
        class="k-pointer"
        role="slider"
        tabIndex={0}
        aria-label="k, the feedback fraction"
        aria-valuemin={x.from}
        aria-valuemax={x.to}
        aria-valuenow={Number(k.toFixed(4))}
        aria-valuetext={`k ${k.toFixed(3)}`}
        style={{ left: rem(across - area.left), top: rem(area.bottom - area.top) }}
        onKeyDown={onKeyDown}
        onBlur={() => (caption.value = null)}
      >
        <svg viewBox="0 0 18 20" aria-hidden="true">
          <path d="M9 0 17 6V20H1V6Z" />
          <text x={9} y={16} text-anchor="middle">
            k
          </text>
        </svg>
      </div>
    </div>
  );
}
