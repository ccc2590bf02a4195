/**
 * Listens at the destination of every audio context that a page makes, without changing what the page does. Runs in the page before its own
 * scripts; `window.soundProbe` then tells when the first click was, when the first sound, and what the contexts counted.
 */
export interface SoundProbe {
  readonly contexts: AudioContext[];
  /** What was connected to a destination, in order. */
  readonly nodes: AudioNode[];
  clickMs: number | null;
  firstSoundMs: number | null;
  /** Highest peak seen in the last look of 2048 samples. */
  peak: number;
  underruns(): (number | null)[];
}

declare global {
  interface Window {
    soundProbe: SoundProbe;
  }
}

export function installSoundProbe(): void {
  const analysers: AnalyserNode[] = [];
  const probe: SoundProbe = {
    contexts: [],
    nodes: [],
    clickMs: null,
    firstSoundMs: null,
    peak: 0,
    underruns: () =>
      probe.contexts.map((context) => {
        const { playbackStats } = context as AudioContext & { playbackStats?: { underrunEvents: number } };
        return playbackStats?.underrunEvents ?? null;
      }),
  };
  window.soundProbe = probe;
  addEventListener('click', () => (probe.clickMs ??= performance.now()), { capture: true });
  const connect = AudioNode.prototype.connect as (this: AudioNode, ...rest: unknown[]) => AudioNode;
  AudioNode.prototype.connect = function (this: AudioNode, ...rest: unknown[]) {
    const [target] = rest;
    if (target instanceof AudioDestinationNode && this.context instanceof AudioContext) {
      const analyser = new AnalyserNode(this.context, { fftSize: 2048 });
      connect.call(this, analyser);
      analysers.push(analyser);
      probe.nodes.push(this);
      if (!probe.contexts.includes(this.context)) probe.contexts.push(this.context);
    }
    return connect.apply(this, rest);
  } as typeof AudioNode.prototype.connect;
  const samples = new Float32Array(2048);
  setInterval(() => {
    probe.peak = 0;
    for (const analyser of analysers) {
      analyser.getFloatTimeDomainData(samples);
      for (const x of samples) probe.peak = Math.max(probe.peak, Math.abs(x));
    }
    if (probe.peak > 0) probe.firstSoundMs ??= performance.now();
  }, 5);
}
