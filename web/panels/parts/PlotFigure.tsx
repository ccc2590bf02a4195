import { type ReadonlySignal, useComputed, useSignal } from '@preact/signals';
import type { ComponentChildren } from 'preact';
import { useRef } from 'preact/hooks';
import type { PlotArea } from '../../draw/plotArea.ts';
import { csvOf, type PlotTable, rowAt, rowWords } from '../../draw/plotData.ts';
import { savedPicture } from '../../draw/savedPicture.ts';
import type { Scale } from '../../draw/scale.ts';
import type { Trace } from '../../draw/traces.ts';
import { useBench, useBenchView } from '../BenchContext.ts';
import { Figure } from './Figure.tsx';
import { PlotCursor } from './PlotCursor.tsx';
import { rootPixels, useSheetSize } from './useSheetSize.ts';
import { WordActions } from './WordActions.tsx';

/** A figure at one size. */
export interface Drawing {
  readonly area: PlotArea;
  readonly x: Scale;
  /** The numbers behind it as they are now: the cursor reads the first, all are saved. Each has a row. */
  readonly tables: () => readonly PlotTable[];
  /** What stands on its canvas now. */
  readonly traces?: () => readonly Trace[];
  /** What is saved is an `svg` under its canvas, and another over it where there is one. */
  readonly picture: ComponentChildren;
}

interface PlotFigureProps {
  readonly number: number;
  readonly className: string;
  /** Names the cursor and what is saved. */
  readonly title: string;
  /** Choices that the caption begins with. */
  readonly lead?: ComponentChildren;
  /** The cursor's words take its place while it reads. */
  readonly caption: ComponentChildren;
  /** Null while there is nothing to draw. */
  readonly draw: (width: number, height: number) => Drawing | null;
  /** Stands in its place meanwhile. */
  readonly empty?: ComponentChildren;
}

/** A figure with axes: read out by a cursor, whose words take the caption's place, and saved as numbers or as a picture. */
export function PlotFigure({ number, className, title, lead, caption, draw, empty }: PlotFigureProps) {
  const bench = useBench();
  const { moment } = useBenchView();
  const { ref, size } = useSheetSize<HTMLDivElement>();
  const at = useSignal<number | null>(null);
  const drawing = size && draw(size.width, size.height);
  const latest = useRef(drawing);
  latest.current = drawing;
  const pixelUnder = (event: PointerEvent, area: PlotArea) => {
    const box = (event.currentTarget as HTMLElement).getBoundingClientRect();
    return Math.max(area.left, Math.min(area.right, ((event.clientX - box.left) * 16) / rootPixels()));
  };
  const follow = (event: PointerEvent) => {
    if (drawing && event.buttons === 0) at.value = pixelUnder(event, drawing.area);
  };
  const reading = useComputed(() => {
    // What moves is read anew with each moment.
    void moment.value;
    if (at.value === null || latest.current === null) return null;
    const { tables, x } = latest.current;
    const [table] = tables();
    return rowWords(table, rowAt(table, x, at.value));
  });
  const file = `fig-${number}-${title.toLowerCase().replaceAll(/[^a-z0-9]+/g, '-')}`;
  const saveCsv = () => drawing && bench.savePlot(file, 'csv', csvOf(drawing.tables()));
  const saveSvg = () => {
    const [under, over = null] = [...(ref.current?.children ?? [])].filter((child) => child instanceof SVGSVGElement);
    if (drawing && under) bench.savePlot(file, 'svg', savedPicture({ under, over }, drawing.area, drawing.traces?.() ?? [], title));
  };
  const actions = drawing && (
    <WordActions
      actions={[
        { words: 'CSV', label: `CSV: save the numbers of Fig. ${number}`, run: saveCsv },
        { words: 'SVG', label: `SVG: save Fig. ${number} as a picture`, run: saveSvg },
      ]}
    />
  );
  return (
    <Figure
      number={number}
      className={className}
      caption={
        <>
          {lead}
          <Words reading={reading}>{caption}</Words>
        </>
      }
      actions={actions}
    >
      <div
        class="plot"
        ref={ref}
        onPointerMove={follow}
        onPointerDown={(event) => {
          if (drawing && event.pointerType !== 'mouse') at.value = pixelUnder(event, drawing.area);
        }}
        onPointerLeave={(event) => {
          if (event.pointerType === 'mouse') at.value = null;
        }}
      >
        {drawing?.picture}
        {drawing && <PlotCursor drawing={drawing} title={title} at={at} words={reading} />}
        {!drawing && empty}
      </div>
    </Figure>
  );
}

/** Apart, so that a moving cursor draws nothing else anew. */
function Words({ reading, children }: { readonly reading: ReadonlySignal<string | null>; readonly children: ComponentChildren }) {
  return <>{reading.value ?? children}</>;
}
