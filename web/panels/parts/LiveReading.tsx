import type { ComponentChildren } from 'preact';

interface LiveReadingProps {
  readonly label: ComponentChildren;
  /** The number as printed, or null when it cannot be read now. */
  readonly value: string | null;
  readonly unit: string;
  /** What it means: «plus: raise k», or why there is no reading. */
  readonly meaning: ComponentChildren;
  readonly large?: boolean;
  /** Past its limit: the number stands reversed. */
  readonly over?: boolean;
}

/** A number measured now: label above, meaning below. */
export function LiveReading({ label, value, unit, meaning, large = false, over = false }: LiveReadingProps) {
  return (
    <div class={large ? 'reading large' : 'reading'}>
      <dt>{label}</dt>
      <dd>
        {value === null ? (
          <span class="unread">no reading</span>
        ) : (
          <span class={`number ${over ? 'over' : 'live'} ${value.length > 4 ? 'long' : ''}`}>
            {value}
            <span class="unit">{unit}</span>
          </span>
        )}
        <span class="meaning">{meaning}</span>
      </dd>
    </div>
  );
}
