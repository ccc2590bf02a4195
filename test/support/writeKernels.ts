/** Writes the kernels out by shape: `npm run kernels`. A test fails when the written file is out of date. */
import { writeFileSync } from 'node:fs';
import { kernelModule } from '../../model/cell/kernels/source.ts';

writeFileSync(new URL('../../model/cell/kernels/square.ts', import.meta.url), kernelModule());
