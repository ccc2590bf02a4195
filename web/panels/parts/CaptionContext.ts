import { type Signal, signal } from '@preact/signals';
import { createContext } from 'preact';

/** What a caption says in place of its own words while a value of its figure is being edited; null otherwise. */
export interface EditingHint {
  readonly words: string;
  readonly refused: boolean;
}

export const CaptionContext = createContext<Signal<EditingHint | null>>(signal(null));
