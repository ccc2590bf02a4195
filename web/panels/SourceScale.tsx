import { useSignal } from '@preact/signals';
import { useMemo } from 'preact/hooks';
import { overviewOf, overviewPath, peakOf } from '../draw/overview.ts';
import { plotArea } from '../draw/plotArea.ts';
import { linearScale } from '../draw/scale.ts';
import type { Region } from '../state/bench.ts';
import { useBench } from './BenchContext.ts';
import { useSheetSize } from './parts/useSheetSize.ts';
import { Ends, Frame } from './SourceDrawing.tsx';
import { SourcePlace } from './SourcePlace.tsx';
import { useLoopDrag } from './useLoopDrag.ts';

const HEIGHT = 50;
const MARGINS = { left: 54, right: 12, top: 3, bottom: 18 };

/** The source as an oscillogram over its time: where it plays, moved by a press or by key, and the part that loops, drawn across it. */
export function SourceScale() {
  const { kind } = useBench().source.value;
  return kind === 'live' || kind === 'tone' ? null : <Measured />;
}

function Measured() {
  const { ref, size } = useSheetSize<HTMLDivElement>();
  return (
    <div class="source-scale" ref={ref}>
      {size && <Drawn width={size.width} />}
    </div>
  );
}

function Drawn({ width }: { readonly width: number }) {
  const bench = useBench();
  const source = bench.source.value;
  const draft = useSignal<Region | null>(null);
  const refused = useSignal<string | null>(null);
  const say = (sentence: string | null) => (refused.value = sentence);
  const area = plotArea(width, HEIGHT, MARGINS);
  const time = linearScale(0, Math.max(source.seconds, 0.001), area.left, area.right);
  const region = draft.value ?? bench.region.value;
  const { trace, peak } = useMemo(() => {
    const overview = overviewOf(bench.sourceSamples(), Math.max(1, Math.floor(area.right - area.left)));
    // Silence has no peak to reach the edges.
    const most = peakOf(overview) || 1;
    return { peak: most, trace: overviewPath(overview, most, area) };
  }, [source, width]);
  return (
    <>
      <div class="source-track" {...useLoopDrag(time, draft, say)}>
        <svg viewBox={`0 0 ${width} ${HEIGHT}`} aria-hidden="true">
          <Frame area={area} time={time} peakV={peak * bench.design.value.fullScaleV} />
          <path class="trace" d={trace} />
          {region && <Ends region={region} area={area} time={time} />}
        </svg>
        <SourcePlace time={time} title={source.title} say={say} />
      </div>
      {refused.value !== null && (
        <p class="caption fault" role="alert">
          {refused.value}
        </p>
      )}
    </>
  );
}
