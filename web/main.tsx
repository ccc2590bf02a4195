import { render } from 'preact';
import { missingForPage } from './audio/features.ts';
import { Missing } from './panels/Missing.tsx';
import { Sheet } from './panels/Sheet.tsx';
import { createBench } from './state/createBench.ts';
import './style/tokens.css';
import './style/type.css';
import './style/layout.css';
import './style/values.css';
import './style/components.css';
import './style/notes.css';
import './style/panels.css';
import './style/tables.css';
import './style/figures.css';
import './style/schematic.css';
import './style/narrow.css';

const place = document.getElementById('sheet');
if (place === null) throw new Error('The page has no place for the sheet');
const missing = missingForPage();
if (missing.length > 0) render(<Missing features={missing} />, place);
else {
  const bench = createBench();
  // What was kept is there within a few milliseconds as a rule; waiting for it spares the sight of another design.
  const patience = new Promise((resolve) => setTimeout(resolve, 300));
  void Promise.race([bench.restored, patience]).then(() => render(<Sheet bench={bench} />, place));
}
