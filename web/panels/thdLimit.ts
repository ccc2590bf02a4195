import { type Signal, signal } from '@preact/signals';
import { createContext } from 'preact';
import { useContext } from 'preact/hooks';

/** The highest THD over the swing that the designer will take, a fraction. It belongs to the sheet, not to the circuit. */
export const FIRST_THD_LIMIT = 0.03;

export const ThdLimitContext = createContext<Signal<number>>(signal(FIRST_THD_LIMIT));

export function useThdLimit(): Signal<number> {
  return useContext(ThdLimitContext);
}

export function overLimit(thd: number, limit: number): boolean {
  return thd > limit;
}
