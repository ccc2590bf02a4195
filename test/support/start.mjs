/**
 * npm start: builds the page and serves it on this machine, from port 4173 or the next one free. Needs no network.
 * Plain JavaScript, so that it can still say what is wrong when nothing is installed.
 */

import { fileURLToPath } from 'node:url';

const configFile = fileURLToPath(new URL('../../vite.config.ts', import.meta.url));

const [major, minor] = process.versions.node.split('.').map(Number);
if (major < 20 || (major === 20 && minor < 19)) stop(`This is Node ${process.versions.node}; Fettle needs Node 20.19 or newer.`);

const { build, preview } = await import('vite').catch(() => stop('Packages are missing: run npm ci first.'));

await build({ configFile, logLevel: 'warn' }).catch((error) => stop(`Fettle could not be built. ${withoutStack(error.message)}`));

const server = await preview({ configFile, preview: { port: 4173, strictPort: false, host: 'localhost', open: false } }).catch((error) =>
  stop(`Fettle is built but could not be served: ${error.message}`),
);
console.log(`Fettle is at ${server.resolvedUrls.local[0]} (stop it with Ctrl+C)`);

function withoutStack(message) {
  return message
    .split('\n')
    .filter((line) => line.trim() !== '' && !/^ +at /.test(line))
    .join('\n');
}

function stop(sentence) {
  console.error(sentence);
  process.exit(1);
}
