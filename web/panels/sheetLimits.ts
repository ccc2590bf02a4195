/** Limits that the designer sets on the sheet. They belong to it, not to the circuit. */
import { type Signal, signal } from '@preact/signals';
import { createContext } from 'preact';
import { useContext } from 'preact/hooks';
import { FIRST_REVERSE_LIMIT_V } from '../draw/limits.ts';

export interface SheetLimits {
  /** The highest THD over the swing that the designer will take, a fraction. */
  readonly thd: Signal<number>;
  /** Reverse voltage that the gate stands by its data sheet, V. */
  readonly reverseV: Signal<number>;
}

export function createSheetLimits(): SheetLimits {
  return { thd: signal(0.03), reverseV: signal(FIRST_REVERSE_LIMIT_V) };
}

export const LimitsContext = createContext<SheetLimits>(createSheetLimits());

export function useThdLimit(): Signal<number> {
  return useContext(LimitsContext).thd;
}

export function useReverseLimit(): Signal<number> {
  return useContext(LimitsContext).reverseV;
}

export function overLimit(thd: number, limit: number): boolean {
  return thd > limit;
}
