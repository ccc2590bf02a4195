/** Writes the kernels out by law and shape: `npm run kernels`. A test fails when a written file is out of date. */
import { writeFileSync } from 'node:fs';
import { kernelModule } from '../../model/cell/kernels/source.ts';

for (const law of ['square', 'gradual', 'smooth'] as const) {
  writeFileSync(new URL(`../../model/cell/kernels/${law}.ts`, import.meta.url), kernelModule(law));
}
