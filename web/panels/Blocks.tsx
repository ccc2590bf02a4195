import { Characteristics } from './Characteristics.tsx';
import { DeviceTable } from './DeviceTable.tsx';
import { Distortion } from './Distortion.tsx';
import { Equation } from './Equation.tsx';
import { FeedbackFigure } from './FeedbackFigure.tsx';
import { GainFigure } from './GainFigure.tsx';
import { GateFigure } from './GateFigure.tsx';
import { LevelTable } from './LevelTable.tsx';
import { Schematic } from './Schematic.tsx';
import { SpectrumFigure } from './SpectrumFigure.tsx';
import { Takes } from './Takes.tsx';
import { TransferFigure } from './TransferFigure.tsx';
import type { Layout } from './useLayout.ts';
import { VariantTable } from './VariantTable.tsx';

/** Equation, figures and tables, in the order in which each width is read. */
export function Blocks({ layout }: { readonly layout: Layout }) {
  const small = (
    <div class="small-figures">
      <GateFigure />
      <SpectrumFigure />
      <GainFigure />
      <TransferFigure />
    </div>
  );
  const lower = (
    <div class="lower-tables">
      <VariantTable />
      <LevelTable />
      <DeviceTable across={layout === 'wide' ? 3 : layout === 'tablet' ? 2 : 1} />
    </div>
  );
  if (layout === 'wide') {
    return (
      <div class="blocks">
        <div class="column first">
          <Schematic form="wide" />
          <Characteristics />
        </div>
        <div class="column second">
          <Equation />
          <Distortion />
          <FeedbackFigure />
          <Takes />
        </div>
        {small}
        {lower}
      </div>
    );
  }
  return (
    <div class="blocks">
      <div class="column first">
        <Equation />
        <Distortion />
      </div>
      <FeedbackFigure />
      <Schematic form={layout === 'phone' ? 'upright' : 'wide'} />
      <Characteristics />
      <Takes />
      {small}
      {lower}
    </div>
  );
}
