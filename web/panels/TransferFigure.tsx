import { useMemo } from 'preact/hooks';
import type { TransferPath } from '../../model/study/transfer.ts';
import { formatQuantity } from '../../model/design/values.ts';
import type { Column, PlotTable } from '../draw/plotData.ts';
import { remembered } from '../draw/remembered.ts';
import { pathCurrentAt, pathOn, plotTransfer, type TransferPlot } from '../draw/transferPlot.ts';
import { gateVolts, voltsText } from '../draw/words.ts';
import type { TransferPlane } from '../state/bench.ts';
import { useBench, useBenchView, usePlaying, useReading } from './BenchContext.ts';
import { Clip } from './parts/Clip.tsx';
import { type Drawing, PlotFigure } from './parts/PlotFigure.tsx';
import { PlotFrame } from './parts/PlotFrame.tsx';
import { Sym } from './parts/Symbol.tsx';

/** Fig. 6: the transfer plane of the FET, and the path that the shadow tone takes on it at this moment. */
export function TransferFigure() {
  const bench = useBench();
  const plane = bench.plane.value;
  const { moment } = useBenchView();
  const plotOf = useMemo(() => remembered(plotTransfer), []);
  const drawn = (width: number, height: number): Drawing | null => {
    if (plane === null) return null;
    const plot = plotOf(plane, width, height);
    const tables = () => transferTables(plane, moment.peek()?.path ?? null);
    return { area: plot.area, x: plot.x, tables, picture: <Picture plot={plot} /> };
  };
  return (
    <PlotFigure
      number={6}
      className="transfer-figure"
      title="Drain current against drain-source voltage"
      caption={
        <>
          Drain current by <Sym of="V" sub="GS" />; thick: now, broken: end of ohmic.
        </>
      }
      draw={drawn}
      empty={<p class="unread empty-plot">no reading{bench.period.value === null && ' yet'}</p>}
    />
  );
}

const currentText = (amperes: number) => formatQuantity(amperes, 'A', 3);

function transferTables(plane: TransferPlane, path: TransferPath | null): PlotTable[] {
  const volts = (name: string, values: ArrayLike<number>): Column => ({ name, unit: 'V', values, print: (v) => `VDS ${voltsText(v)}` });
  const current = (name: string, values: ArrayLike<number>): Column => ({ name, unit: 'A', values, print: currentText });
  const across = volts('VDS', plane.drainSourceV);
  const now = plane.drainSourceV.map((v) => (path === null ? Number.NaN : pathCurrentAt(path, v)));
  return [
    { x: across, ys: [current('now', now), current('end of ohmic', plane.edgeA)] },
    { x: across, ys: plane.curves.map(({ gateV, drainA }) => current(`at VGS ${gateVolts(gateV)}`, drainA)) },
    ...(path === null ? [] : [{ x: volts('VDS, path of the tone', path.drainSourceV), ys: [current('path of the tone', path.drainA)] }]),
  ];
}

function Picture({ plot }: { readonly plot: TransferPlot }) {
  const { area, x, y } = plot;
  const path = useBenchView().moment.value?.path ?? null;
  const playing = usePlaying();
  const reading = useReading();
  const drawn = path && pathOn({ x, y }, path);
  const still = useMemo(() => <Still plot={plot} />, [plot]);
  const at = reading === null ? '' : `; the shadow tone at a gate of ${gateVolts(reading.vgsV)}`;
  return (
    <svg
      viewBox={`0 0 ${area.width} ${area.height}`}
      role="img"
      aria-label={`Drain current against drain-source voltage by gate voltage${at}`}
    >
      {still}
      {drawn && <path class="now-line path-line" clip-path="url(#transfer-clip)" d={drawn.line} />}
      {drawn && <circle class={playing ? 'present' : 'present hollow'} cx={drawn.crest.x} cy={drawn.crest.y} r={4.5} />}
    </svg>
  );
}

/** What stays while the path moves. */
function Still({ plot }: { readonly plot: TransferPlot }) {
  const { area } = plot;
  const [middleX, middleY] = [(area.left + area.right) / 2, (area.top + area.bottom) / 2];
  return (
    <>
      <PlotFrame area={area} xTicks={plot.xTicks} yTicks={plot.yTicks} />
      <path class="axis" d={`M${middleX} ${area.top}V${area.bottom}M${area.left} ${middleY}H${area.right}`} />
      <Clip id="transfer-clip" area={area}>
        {plot.curves.map((curve) => (
          <path key={curve} class="curve" d={curve} />
        ))}
        <path class="dash-dot" d={plot.edge} />
      </Clip>
      {plot.labels.map(({ words, place, side }) => (
        <text
          key={words}
          class="axis-text"
          x={side === 'right' ? place.x + 5 : place.x}
          y={side === 'right' ? place.y + 3.5 : place.y - 6}
          text-anchor={side === 'right' ? 'start' : 'middle'}
        >
          {words}
        </text>
      ))}
    </>
  );
}
