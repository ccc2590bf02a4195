import { deviceOf } from '../../model/cell/fromDesign.ts';
import { parseQuantity } from '../../model/design/values.ts';
import { signedHarmonic } from '../../model/study/signed.ts';
import { decimals, gateVolts, percentText, signedDecimals, signedPercentText } from '../draw/words.ts';
import type { Bench } from '../state/bench.ts';
import type { Limit } from '../state/limits.ts';
import { useBench, useBenchView, useReading, useVariant } from './BenchContext.ts';
import { EditableValue } from './parts/EditableValue.tsx';
import { LiveReading } from './parts/LiveReading.tsx';
import { Sym } from './parts/Symbol.tsx';
import { overLimit, useThdLimit } from './sheetLimits.ts';

const PERCENT = '\u2009%';

/** THD at this gate voltage, the worst over the swing, and the two harmonics that say what to do. */
export function Distortion() {
  const bench = useBench();
  const limit = useThdLimit();
  const moment = useBenchView().moment.value;
  const read = moment?.reading ?? null;
  const reading = useReading();
  const variant = useVariant();
  const { channel } = deviceOf(variant, 0);
  const fitted = variant.cell.feedback.kind !== 'none';
  const why = read !== null && 'fault' in read ? read.fault : '';
  const h2 = reading === null ? null : signedHarmonic(reading, 2, channel);
  const h3 = reading === null ? null : signedHarmonic(reading, 3, channel);
  return (
    <section aria-label="Distortion, by the shadow tone">
      <dl class="distortion">
        <LiveReading
          large
          label="THD now"
          value={reading && percentText(reading.thdFundamental)}
          unit={PERCENT}
          meaning={reading ? <BandWords band={moment?.thdBand ?? null} gateV={reading.vgsV} /> : ''}
        />
        <Worst worst={bench.worst.value} limit={limit} />
        <LiveReading
          label={
            <>
              <Sym of="H" sub="2" />, even
            </>
          }
          value={h2 === null ? null : signedPercentText(h2)}
          unit={PERCENT}
          meaning={h2 === null ? '' : <H2Words h2={h2} fitted={fitted} />}
        />
        <LiveReading
          label={
            <>
              <Sym of="H" sub="3" />, odd
            </>
          }
          value={h3 === null ? null : signedPercentText(h3)}
          unit={PERCENT}
          meaning={h3 === null ? '' : <H3Words h3={h3} />}
        />
      </dl>
      {why !== '' && <p class="why fault">No reading: {why}</p>}
    </section>
  );
}

/** What parts of 1 % make of it, and the gate that it is read at. */
function BandWords({ band, gateV }: { readonly band: readonly [number, number] | null; readonly gateV: number }) {
  if (band === null) return <>gate at {gateVolts(gateV)}</>;
  const [low, high] = band.map(percentText);
  if (low === high) return <>the same with 1{PERCENT} parts</>;
  return (
    <>
      {low} to {high}, 1{PERCENT} parts
    </>
  );
}

/** As printed, 0.000 %. */
const NOTHING = 5e-6;

function H2Words({ h2, fitted }: { readonly h2: number; readonly fitted: boolean }) {
  if (Math.abs(h2) < NOTHING) return <>nulled</>;
  if (!fitted) return h2 > 0 ? <>plus: feedback lowers it</> : <>minus: feedback adds to it</>;
  return (
    <>
      {h2 > 0 ? 'plus: raise ' : 'minus: lower '}
      <i>k</i>
    </>
  );
}

function H3Words({ h3 }: { readonly h3: number }) {
  if (Math.abs(h3) < NOTHING) return <>none to speak of</>;
  return (
    <>
      not cured by <i>k</i>
    </>
  );
}

function Worst({ worst, limit }: { readonly worst: Bench['worst']['value']; readonly limit: Limit }) {
  const over = worst !== null && overLimit(worst.thdFundamental, limit.value);
  const editable = (
    <EditableValue
      label="Limit of THD over the swing"
      short="The limit"
      value={100 * limit.value}
      stepping={{ kind: 'preferred', series: 'E12', from: 0.01 }}
      format={(percent) => `${decimals(percent, percent < 1 ? 2 : 1)}${PERCENT}`}
      read={(text) => parseQuantity(text.replace(/%\s*$/, ''), '')}
      onSet={(percent) => limit.set((percent as number) / 100)}
    />
  );
  return (
    <LiveReading
      label="Worst over the swing"
      value={worst && percentText(worst.thdFundamental)}
      unit={PERCENT}
      over={over}
      meaning={
        worst === null ? (
          'not measured yet'
        ) : (
          <>
            {over ? <span class="fault">over</span> : 'within'} {editable}, at {signedDecimals(worst.gainDb, 1)}
            {'\u2009'}dB
          </>
        )
      }
    />
  );
}
