import { amplifierLimit, deviceLimit, limitWords } from '../draw/limits.ts';
import { useBench, useBenchView, useReading, useVariant } from './BenchContext.ts';
import { useReverseLimit } from './sheetLimits.ts';
import { useHeldLimit } from './useHeldLimit.ts';

/** What the FET and the amplifier are driven past, in words; null while they are within their limits. */
export function useLimits(): { readonly device: string | null; readonly amplifier: string | null } {
  const variant = useVariant();
  const reading = useReading();
  const levels = useBenchView().slowLive.value;
  const { fullScaleV } = useBench().design.value;
  const reverse = useReverseLimit().value;
  const outputPeakV = levels === null ? 0 : fullScaleV * 10 ** (levels.outputPeakDbfs / 20);
  const now = performance.now();
  const device = useHeldLimit(reading && deviceLimit(variant, reading, levels?.drainPeakV ?? 0, reverse), now);
  const amplifier = useHeldLimit(reading && amplifierLimit(variant, reading, outputPeakV), now);
  return {
    device: device && limitWords(device, reverse),
    amplifier: amplifier && limitWords(amplifier, variant.output.swingV ?? amplifier.size),
  };
}
