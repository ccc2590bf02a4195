import type { ComponentChildren } from 'preact';
import type { Place } from '../../draw/schematic.ts';
import { rem } from './useSheetSize.ts';

/** Words or a value at a place of a drawing. */
export function At({ place, children }: { readonly place: Place; readonly children: ComponentChildren }) {
  return (
    <div class={`at ${place.align}`} style={{ left: rem(place.x), top: rem(place.y) }}>
      {children}
    </div>
  );
}
