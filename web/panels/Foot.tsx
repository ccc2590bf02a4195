import { Load } from './Load.tsx';
import { Caution } from './parts/Note.tsx';

/** How to read the sheet, what its readings leave out, and the cautions of the bench. */
export function Foot() {
  return (
    <footer class="foot">
      <p>
        <b>Reading the sheet.</b> <u>Underlined</u>: change it here. <span class="live-sample">Coloured</span>: measured at this moment.{' '}
        <span class="over">Reversed</span>: past its limit. The letters A to D are variants of the circuit; an empty letter takes a copy of
        the one that is heard.
      </p>
      <p>
        <b>Shadow tone.</b> THD is read on a silent copy of this cell at the control voltage of the moment. It is quasi-static: it leaves
        out what the control does while it moves.
      </p>
      <p>
        <Caution /> <b>At your ears.</b> The page cannot know how loud it is where you sit. Start low; at 85 dBA eight hours are the limit,
        at 94 dBA one (NIOSH). Thumps and DC steps over-travel loudspeakers, sustained highs burn tweeters.
      </p>
      <p>
        <Caution /> <b>On the bench.</b> Keep parts in conductive foam: static kills gates. Keep the gate’s current under its sheet’s limit,
        with a series resistor. Use a battery or an approved supply, never an open mains chassis, and follow your local code.
      </p>
      <Load />
    </footer>
  );
}
