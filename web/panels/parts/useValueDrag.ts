import { useRef, useState } from 'preact/hooks';
import { freeValue, type Stepping, stepMany } from './stepping.ts';

/** Pointer travel, CSS pixels, before a press becomes a drag, and for each step of the drag. */
const SLACK = 4;
const TRAVEL_PER_STEP = 9;

interface DragOptions {
  readonly value: number | null;
  readonly stepping: Stepping;
  readonly set: (value: number) => void;
  readonly click: () => void;
}

/** Dragging right or up raises a value through its steps (Shift: free); a press without travel is a click. A finger drags sideways. */
export function useValueDrag({ value, stepping, set, click }: DragOptions) {
  const [dragging, setDragging] = useState(false);
  const press = useRef<{ x: number; y: number; value: number | null; last: number | null; moved: boolean } | null>(null);
  const end = () => {
    press.current = null;
    setDragging(false);
  };
  const handlers = {
    onPointerDown: (event: PointerEvent) => {
      if (event.button !== 0) return;
      press.current = { x: event.clientX, y: event.clientY, value, last: value, moved: false };
      (event.currentTarget as HTMLElement).setPointerCapture(event.pointerId);
    },
    onPointerMove: (event: PointerEvent) => {
      const start = press.current;
      if (start === null || start.value === null) return;
      const travel = event.clientX - start.x - (event.pointerType === 'touch' ? 0 : event.clientY - start.y);
      if (!start.moved && Math.abs(travel) < SLACK) return;
      start.moved = true;
      setDragging(true);
      const steps = travel / TRAVEL_PER_STEP;
      const next = event.shiftKey ? freeValue(start.value, stepping, steps) : stepMany(start.value, stepping, Math.trunc(steps));
      if (next === start.last) return;
      start.last = next;
      set(next);
    },
    onPointerUp: () => {
      const start = press.current;
      end();
      if (start !== null && !start.moved) click();
    },
    onPointerCancel: end,
  };
  return { dragging, handlers };
}
