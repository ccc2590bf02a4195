/** The one module that the page adds to its context. */
import { CellProcessor } from './cell.ts';
import { PassProcessor } from './pass.ts';
import { CELL_PROCESSOR, PASS_PROCESSOR } from './protocol.ts';

registerProcessor(CELL_PROCESSOR, CellProcessor);
registerProcessor(PASS_PROCESSOR, PassProcessor);
