import type { ComponentChildren } from 'preact';
import type { Fitted, Form, Slot } from '../draw/schematic.ts';
import { CircuitValue } from './CircuitValue.tsx';
import { ControlValues } from './ControlValues.tsx';
import { DeviceValues } from './DeviceValues.tsx';
import { FeedbackChoice } from './FeedbackChoice.tsx';
import { LiveVolts } from './LiveVolts.tsx';
import { Named } from './parts/Named.tsx';

/** What stands at each place of the drawing, for the parts that are fitted. */
export function schematicValues(fitted: Fitted, form: Form, deviceLimit: string | null): Values {
  const resistors = fitted.feedback === 'resistor';
  return {
    ...inputValues(fitted),
    series: (
      <Named name="R1" over>
        <CircuitValue path="cell.seriesOhm" label="R1, in series with the signal" short="R1" />
      </Named>
    ),
    feedback: (
      <Named name="feedback" over>
        <FeedbackChoice />
      </Named>
    ),
    ...(resistors && {
      blocking: (
        <Named name="C1" over={form === 'upright'}>
          <CircuitValue path="cell.feedback.blockingF" label="C1, blocking capacitor in series with R2" short="C1" />
        </Named>
      ),
      drain: (
        <Named name="R2" over={form === 'upright'}>
          <CircuitValue path="cell.feedback.drainOhm" label="R2, drain to gate" short="R2" />
        </Named>
      ),
    }),
    ...(fitted.feedback === 'buffered' && {
      fraction: (
        <Named name={form === 'upright' ? 'share' : 'buffer, share'} over={form === 'upright'}>
          <CircuitValue path="cell.feedback.fraction" label="Share of the drain that the buffer adds at the gate" short="The share" />
        </Named>
      ),
    }),
    control: (
      <Named name="R3" over={form === 'upright'}>
        <CircuitValue path="cell.controlOhm" label="R3, control to gate" short="R3" />
      </Named>
    ),
    ...(fitted.rows.control ? { fromDriver: <span class="name">driver</span> } : { generator: <ControlValues /> }),
    ...(fitted.rows.source && { sourcePin: <span class="name">J1, source</span> }),
    gateLive: <LiveVolts symbol={form === 'wide' ? 'GS' : null} which="gateSourceV" />,
    drainLive: <LiveVolts symbol={fitted.rows.source ? 'D' : 'DS'} which="drainPeakV" />,
    ...(deviceLimit && { limit: <p class="fault limit-words">{deviceLimit}</p> }),
    device: <DeviceValues form={form} />,
    ...(fitted.rows.output ? { toOutput: <span class="name">drain</span> } : outputValues(form)),
    ground: <span class="name">0 V</span>,
  };
}

type Values = Partial<Record<Slot, ComponentChildren>>;

function inputValues({ rows }: Fitted): Values {
  if (rows.input) return { in: <span class="name">board</span> };
  return {
    in: <LiveVolts name="in" which="inputPeakV" />,
    source: (
      <>
        <span class="name">from</span> <CircuitValue path="cell.sourceOhm" label="Resistance of the signal source" short="The source" />
      </>
    ),
  };
}

function outputValues(form: Form): Values {
  return {
    load: (
      <div class="stack">
        <Named name="R4" over={form === 'upright'}>
          <CircuitValue path="cell.loadOhm" label="R4, load at the drain" short="R4" />
        </Named>
        <Named name="C2" over={form === 'upright'}>
          <CircuitValue path="cell.loadF" label="C2, load capacitance at the drain" short="C2" zeroIsAbsent />
        </Named>
      </div>
    ),
    makeUp: (
      <div class="stack ends">
        <CircuitValue path="output.gainDb" label="Make-up gain" short="Make-up" signed />
        <span class="name">make-up</span>
      </div>
    ),
    out: <LiveVolts which="output" />,
  };
}
