import { render } from 'preact';
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
render(<Sheet bench={createBench()} />, place);
