import type { ComponentChildren } from 'preact';
import type { Point } from '../draw/line.ts';
import type { Box } from '../draw/placeSlip.ts';
import type { Fitted, PartSymbol, Segment } from '../draw/schematic.ts';
import { AMPLIFIER, BUFFER, DIODE, GENERATOR_RADIUS, INDUCTOR, JFET, PLATES, RESISTOR, SUM_RADIUS } from '../draw/schematicParts.ts';

interface SymbolsProps {
  readonly drawing: {
    readonly wires: readonly Segment[];
    readonly dots: readonly Point[];
    readonly terminals: readonly Point[];
    readonly grounds: readonly Point[];
    readonly symbols: readonly PartSymbol[];
  };
  readonly fitted: Pick<Fitted, 'wave' | 'channel'>;
  /** Round the parts that are past a limit. */
  readonly marked: readonly Box[];
}

/** Wires and symbols of a drawing, in the standard shapes (IEC 60617). */
export function SchematicSymbols({ drawing, fitted, marked }: SymbolsProps) {
  return (
    <>
      {drawing.wires.map(({ x1, y1, x2, y2 }) => (
        <line key={`${x1} ${y1} ${x2} ${y2}`} x1={x1} y1={y1} x2={x2} y2={y2} />
      ))}
      {drawing.dots.map(({ x, y }) => (
        <circle key={`${x} ${y}`} class="dot" cx={x} cy={y} r={3.2} />
      ))}
      {drawing.terminals.map(({ x, y }) => (
        <circle key={`${x} ${y}`} class="terminal" cx={x} cy={y} r={4} />
      ))}
      {drawing.grounds.map(({ x, y }) => (
        <g key={`${x} ${y}`}>
          <path d={`M${x} ${y}v9`} />
          <path class="plate" d={`M${x - 11} ${y + 9}h22`} />
        </g>
      ))}
      {drawing.symbols.map((symbol) => (
        <g key={`${symbol.kind} ${symbol.x} ${symbol.y}`} class="symbol" transform={`translate(${symbol.x} ${symbol.y})`}>
          {shapeOf(symbol.kind, fitted)}
        </g>
      ))}
      {marked.map((box) => (
        <Corners key={`${box.left} ${box.top}`} {...box} />
      ))}
    </>
  );
}

function shapeOf(kind: PartSymbol['kind'], fitted: SymbolsProps['fitted']): ComponentChildren {
  const { long, across } = RESISTOR;
  switch (kind) {
    case 'resistor':
      return <rect x={-long / 2} y={-across / 2} width={long} height={across} />;
    case 'resistorUpright':
      return <rect x={-across / 2} y={-long / 2} width={across} height={long} />;
    case 'capacitor':
      return <path class="plate" d={`M${-PLATES.wide / 2} ${-PLATES.apart / 2}h${PLATES.wide}m0 ${PLATES.apart}h${-PLATES.wide}`} />;
    case 'capacitorAcross':
      return <path class="plate" d={`M${-PLATES.apart / 2} ${-PLATES.wide / 2}v${PLATES.wide}m${PLATES.apart} 0v${-PLATES.wide}`} />;
    case 'inductor':
      return <path d={`M${-INDUCTOR.turns * INDUCTOR.radius} 0${'a7 7 0 0 1 14 0'.repeat(INDUCTOR.turns)}`} />;
    case 'diode':
      return <Diode channel={fitted.channel} />;
    case 'amplifier':
      return <path d={`M${-AMPLIFIER.long / 2} ${-AMPLIFIER.high / 2}v${AMPLIFIER.high}l${AMPLIFIER.long} ${-AMPLIFIER.high / 2}Z`} />;
    case 'buffer':
      return <path d={`M${-BUFFER.wide / 2} ${-BUFFER.high / 2}h${BUFFER.wide}L0 ${BUFFER.high / 2}Z`} />;
    case 'sum':
      return (
        <>
          <circle r={SUM_RADIUS} />
          <path d="M-4.5 0h9M0 -4.5v9" />
        </>
      );
    case 'generator':
      return (
        <>
          <circle r={GENERATOR_RADIUS} />
          <path d={waves[fitted.wave]} />
        </>
      );
    case 'jfet':
      return <Jfet channel={fitted.channel} />;
  }
}

/** What stands inside the circle of the control's source: its shape, or the line through a steady voltage. */
const waves = {
  sine: 'M-8 0C-6 -9 -2 -9 0 0S6 9 8 0',
  triangle: 'M-8 0 -4 -6 4 6 8 0',
  square: 'M-8 5.5V-5.5H0V5.5H8V-5.5',
  rising: 'M-8 5.5 6 -5.5V5.5',
  falling: 'M-6 5.5V-5.5L8 5.5',
  fixed: `M0 ${-GENERATOR_RADIUS}V${GENERATOR_RADIUS}`,
  other: 'M-8 3C-6 3 -6 -6 -3 -6S0 3 8 3',
} as const;

/** The gate in line with the source; its arrow points into an n-channel and out of a p-channel. */
function Jfet({ channel }: { readonly channel: 'n' | 'p' }) {
  const { left, above, below, drainAbove } = JFET;
  const arrow = channel === 'n' ? `M${-left - 1} 0l-15 -6v12Z` : `M${-left - 18} 0l15 -6v12Z`;
  return (
    <>
      <path class="channel" d={`M${-left} ${-above}V${below}`} />
      <path d={`M${-left} ${-drainAbove}H0M${-left} 0H0`} />
      <path class="solid" d={arrow} />
    </>
  );
}

/** From the gate above to the source pin below; the other way round for a p-channel part. */
function Diode({ channel }: { readonly channel: 'n' | 'p' }) {
  const [half, wide] = [DIODE.long / 2, DIODE.wide / 2];
  const [base, tip] = channel === 'n' ? [-half, half] : [half, -half];
  return <path d={`M${-wide} ${base}h${2 * wide}L0 ${tip}ZM${-wide} ${tip}h${2 * wide}`} />;
}

/** Four corner marks round a part that is past its limit. */
function Corners({ left, top, width, height }: Box) {
  const [right, bottom, arm] = [left + width, top + height, 10];
  return (
    <path
      class="corners"
      d={`M${left} ${top + arm}V${top}h${arm}M${right - arm} ${top}h${arm}v${arm}M${right} ${bottom - arm}v${arm}h${-arm}M${left + arm} ${bottom}h${-arm}v${-arm}`}
    />
  );
}
