import type { ComponentChildren } from 'preact';
import { useLayoutEffect, useRef, useState } from 'preact/hooks';
import { type Box, placeSlip } from '../../draw/placeSlip.ts';

/** What a slip must not hide, and what it should not cross. */
const VALUES = '.value, .value-like, .live, .over, .name, .sym, button, h1, figcaption, caption, dt, .meaning, .sentence, .caution, text';
const LINES = '.schematic line, .schematic .symbol';

/** The slip beside a value being edited. It stands inside the value's own element and finds a place where it hides no other value. */
export function Slip({ refused, children }: { readonly refused: boolean; readonly children: ComponentChildren }) {
  const ref = useRef<HTMLSpanElement>(null);
  const [offset, setOffset] = useState<{ left: number; top: number } | null>(null);
  // Runs after every render, since the words decide the size.
  useLayoutEffect(() => {
    const slip = ref.current;
    const anchor = slip?.closest('.editing');
    const sheet = slip?.closest('.sheet');
    if (!slip || !anchor || !sheet) return;
    const own = anchor.getBoundingClientRect();
    const others = (selector: string): Box[] =>
      [...sheet.querySelectorAll(selector)]
        .filter((element) => !anchor.contains(element) && !element.contains(anchor))
        .map((element) => element.getBoundingClientRect());
    const input = anchor.querySelector('input')?.getBoundingClientRect() ?? own;
    const page = { left: 4, top: 4, width: document.documentElement.clientWidth - 8, height: window.innerHeight - 8 };
    const place = placeSlip(input, slip.getBoundingClientRect(), { values: others(VALUES), lines: others(LINES) }, page);
    const next = { left: Math.round(place.left - own.left), top: Math.round(place.top - own.top) };
    if (offset?.left !== next.left || offset.top !== next.top) setOffset(next);
  });
  const style = offset ? { left: `${offset.left}px`, top: `${offset.top}px` } : { visibility: 'hidden' as const };
  return (
    <span ref={ref} class={refused ? 'slip refused' : 'slip'} style={style} role={refused ? 'alert' : undefined}>
      {children}
    </span>
  );
}
