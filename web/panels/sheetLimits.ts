import type { Limit, Limits } from '../state/limits.ts';
import { useBench } from './BenchContext.ts';

export function useSheetLimits(): Limits {
  return useBench().limits;
}

export function useThdLimit(): Limit {
  return useBench().limits.thd;
}

export function useReverseLimit(): Limit {
  return useBench().limits.reverseV;
}

export function overLimit(thd: number, limit: number): boolean {
  return thd > limit;
}
