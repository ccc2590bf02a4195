import { createSpectrumAnalyser } from '../../model/measure/spectrum.ts';
import type { Spectrum } from './spectrumPlot.ts';

/** Samples in a window: 0.34 s at 48 kHz, bins 2.9 Hz apart. */
const SIZE = 16384;

/** Reads the latest window and gives its spectrum. Each trace needs a reader of its own: the powers are the same array at every call. */
export function createSpectrumReader(read: (into: Float32Array) => void): (rateHz: number) => Spectrum {
  const analyser = createSpectrumAnalyser(SIZE);
  const samples = new Float32Array(SIZE);
  return (rateHz) => {
    read(samples);
    return { powers: analyser.analyse(samples), binHz: rateHz / SIZE };
  };
}
