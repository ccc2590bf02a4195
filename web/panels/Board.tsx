import type { ComponentChildren } from 'preact';
import { boardLadders } from '../draw/board.ts';
import { drawLadder, type Ladder, type LadderDrawing, type LadderPart, type PartValue } from '../draw/ladder.ts';
import type { Box } from '../draw/placeSlip.ts';
import { type Fitted, type Form, fittedIn } from '../draw/schematic.ts';
import { AMPLIFIER } from '../draw/schematicParts.ts';
import { useVariant } from './BenchContext.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { ControlValues } from './ControlValues.tsx';
import { LiveVolts } from './LiveVolts.tsx';
import { At } from './parts/At.tsx';
import { Named } from './parts/Named.tsx';
import { rem } from './parts/useSheetSize.ts';
import { SchematicSymbols } from './SchematicSymbols.tsx';

interface BoardProps {
  readonly width: number;
  readonly form: Form;
  /** The make-up amplifier is past its rail. */
  readonly amplifierPast: boolean;
}

/** Rows of the board around the cell, for what is fitted. */
export function Board({ width, form, amplifierPast }: BoardProps) {
  const variant = useVariant();
  const fitted = fittedIn(variant);
  return (
    <div class="board">
      {boardLadders(variant).map((ladder) => {
        const drawing = drawLadder(ladder, width, form === 'wide' ? 330 : 216);
        return <Row key={ladder.words} ladder={ladder} drawing={drawing} fitted={fitted} amplifierPast={amplifierPast} />;
      })}
    </div>
  );
}

interface RowProps extends Pick<BoardProps, 'amplifierPast'> {
  readonly ladder: Ladder;
  readonly drawing: LadderDrawing;
  readonly fitted: Fitted;
}

function Row({ ladder, drawing, fitted, amplifierPast }: RowProps) {
  const marked = amplifierPast && fitted.rows.output ? amplifierBoxes(ladder, drawing) : [];
  return (
    <div class="drawing" style={{ width: rem(drawing.width), height: rem(drawing.height) }}>
      <svg viewBox={`0 0 ${drawing.width} ${drawing.height}`} role="img" aria-label={ladder.words}>
        <SchematicSymbols drawing={drawing} fitted={fitted} marked={marked} />
      </svg>
      {drawing.words.map(({ text, place }) => (
        <At key={`${text} ${place.x} ${place.y}`} place={place}>
          <span class="name">{text}</span>
        </At>
      ))}
      {ladder.parts.map((part, index) =>
        valuesOf(part).map((values, n) => {
          const place = drawing.places[index][n];
          return (
            place !== undefined && (
              <At key={`${place.x} ${place.y}`} place={place}>
                {values}
              </At>
            )
          );
        }),
      )}
    </div>
  );
}

function amplifierBoxes(ladder: Ladder, { symbols }: LadderDrawing): Box[] {
  if (!ladder.parts.some((part) => part.at === 'end' && part.shows === 'output')) return [];
  const { long, high } = AMPLIFIER;
  return symbols
    .filter(({ kind }) => kind === 'amplifier')
    .map(({ x, y }) => ({ left: x - long / 2 - 8, top: y - high / 2 - 7, width: long + 14, height: high + 14 }));
}

/** What stands at each of a part's places. */
function valuesOf(part: LadderPart): ComponentChildren[] {
  switch (part.at) {
    case 'start':
    case 'end':
      if (part.shows === undefined) return [];
      return [typeof part.shows === 'string' ? <LiveVolts key="live" which={part.shows} /> : <Value key="value" value={part.shows} />];
    case 'earth':
      return [];
    case 'series':
      return [<Value key="over" value={part.value} over />, ...(part.under ? [<Value key="under" value={part.under} />] : [])];
    case 'shunt':
    case 'stage':
      return [
        <div key="stack" class="stack">
          {part.values.map((value) => (
            <Value key={value.path} value={value} over={part.at === 'shunt' && part.values.length === 1} />
          ))}
        </div>,
      ];
    case 'generator':
      return [<ControlValues key="control" />];
  }
}

function Value({ value, over = false }: { readonly value: PartValue; readonly over?: boolean }) {
  const { name, ...rest } = value;
  if (name === '') return <CircuitValue {...rest} />;
  return (
    <Named name={name} over={over}>
      <CircuitValue {...rest} />
    </Named>
  );
}
