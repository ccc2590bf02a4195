import { drawSchematic, fittedIn, type Form, type Slot } from '../draw/schematic.ts';
import { useVariant } from './BenchContext.ts';
import { Board } from './Board.tsx';
import { Fittings } from './Fittings.tsx';
import { At } from './parts/At.tsx';
import { Figure } from './parts/Figure.tsx';
import { rem, useSheetSize } from './parts/useSheetSize.ts';
import { SchematicSymbols } from './SchematicSymbols.tsx';
import { ControlSentence } from './ControlSentence.tsx';
import { schematicValues } from './SchematicValues.tsx';
import { useLimits } from './useLimits.ts';

/** Fig. 1: the cell as it is fitted, with every value changed where it stands. */
export function Schematic({ form }: { readonly form: Form }) {
  const variant = useVariant();
  const { ref, size } = useSheetSize<HTMLDivElement>();
  const fitted = fittedIn(variant);
  const drawing = size && drawSchematic(fitted, size.width, form);
  const limits = useLimits();
  const marked = [
    ...(drawing && limits.device ? [drawing.deviceBox] : []),
    ...(drawing && limits.amplifier && !fitted.rows.output ? [drawing.amplifierBox] : []),
  ];
  const values = schematicValues(fitted, form, limits.device);
  return (
    <Figure
      number={1}
      className={`schematic ${form}`}
      caption={'The cell; in colour: peaks of the last 1/30\u2009s. Underlined: type 6k8, step by the arrow keys, or drag.'}
    >
      <div class="drawing" ref={ref} style={{ height: rem(drawing?.height ?? 346) }}>
        {drawing && (
          <>
            <svg viewBox={`0 0 ${drawing.width} ${drawing.height}`} role="img" aria-label={spoken(fitted.feedback)}>
              <SchematicSymbols drawing={{ ...drawing, grounds: [drawing.ground] }} fitted={fitted} marked={marked} />
            </svg>
            {(Object.keys(values) as Slot[]).map((slot) => {
              const place = drawing.places[slot];
              return (
                place !== undefined && (
                  <At key={slot} place={place}>
                    {values[slot]}
                  </At>
                )
              );
            })}
          </>
        )}
      </div>
      {drawing && <Board width={drawing.width} form={form} amplifierPast={limits.amplifier !== null} />}
      <ControlSentence />
      <Fittings />
      {form === 'upright' && limits.device && <p class="fault limit-words below">J1: {limits.device}.</p>}
      {limits.amplifier && <p class="fault limit-words below">The amplifier {limits.amplifier}.</p>}
    </Figure>
  );
}

function spoken(feedback: 'none' | 'resistor' | 'buffered'): string {
  const ways = {
    none: 'no feedback',
    resistor: 'a resistor from drain to gate',
    buffered: 'a buffered fraction of the drain added at the gate',
  };
  return `Schematic: the signal goes through R1 to the drain of a junction FET whose source is at 0 volts, with ${ways[feedback]}; the control reaches the gate through R3, and an amplifier follows the drain`;
}
