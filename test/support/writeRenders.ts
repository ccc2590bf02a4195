/** Writes the SHA-256 of the three renders to test/reference/renders.json: `npm run renders`, after a change of the engine's bits that is meant. */
import { writeFileSync } from 'node:fs';
import { RENDER_NAMES, renderNamed, sha256 } from './sameRenders.ts';

const committed: Record<string, string> = {};
for (const name of RENDER_NAMES) committed[name] = await sha256(renderNamed(name));
writeFileSync(new URL('../reference/renders.json', import.meta.url), `${JSON.stringify(committed, null, 2)}\n`);
