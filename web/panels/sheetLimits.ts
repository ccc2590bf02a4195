/** Limits that the designer sets on the sheet. They belong to it, not to the circuit. */
import { type Signal, signal } from '@preact/signals';
import { createContext } from 'preact';
import { useContext } from 'preact/hooks';
import { FIRST_REVERSE_LIMIT_V } from '../draw/limits.ts';

export interface SheetLimits {
  /** The highest THD over the swing that the designer will take, a fraction. */
  readonly thd: Signal<number>;
  /** The most that the control alone may leave at the drain, V peak; null asks nothing. */
  readonly feedthroughV: Signal<number | null>;
  /** What the control's circuit can deliver, either side of 0 V; null asks nothing. */
  readonly controlV: Signal<number | null>;
  /** How far past VGS(off) the gate's far end must lie at least, V; null asks nothing. */
  readonly pastOffV: Signal<number | null>;
  /** Reverse voltage that the gate stands by its data sheet, V. */
  readonly reverseV: Signal<number>;
}

export function createSheetLimits(): SheetLimits {
  return {
    thd: signal(0.03),
    feedthroughV: signal<number | null>(0.006),
    controlV: signal<number | null>(5),
    pastOffV: signal<number | null>(0.1),
    reverseV: signal(FIRST_REVERSE_LIMIT_V),
  };
}

export const LimitsContext = createContext<SheetLimits>(createSheetLimits());

export function useSheetLimits(): SheetLimits {
  return useContext(LimitsContext);
}

export function useThdLimit(): Signal<number> {
  return useContext(LimitsContext).thd;
}

export function useReverseLimit(): Signal<number> {
  return useContext(LimitsContext).reverseV;
}

export function overLimit(thd: number, limit: number): boolean {
  return thd > limit;
}
