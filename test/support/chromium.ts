import { execFileSync } from 'node:child_process';
import { accessSync, constants, existsSync } from 'node:fs';
import { delimiter, join } from 'node:path';

const NAMES = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];

const MAC_PLACES = [
  '/Applications/Chromium.app/Contents/MacOS/Chromium',
  '/Applications/Google Chrome.app/Contents/MacOS/Google Chrome',
  `${process.env.HOME}/Applications/Google Chrome.app/Contents/MacOS/Google Chrome`,
];

/** The browser that the page tests drive: FETTLE_CHROMIUM, else the first one found. Throws a sentence that says what to install. */
export function findChromium(): string {
  const chosen = process.env.FETTLE_CHROMIUM;
  if (chosen !== undefined) {
    if (!canRun(chosen)) throw new Error(`FETTLE_CHROMIUM is ${chosen}; expected the path of a Chromium or Chrome that can be run`);
    return chosen;
  }
  const folders = (process.env.PATH ?? '').split(delimiter);
  const places = [...NAMES.flatMap((name) => folders.map((folder) => join(folder, name))), ...MAC_PLACES];
  const found = places.find(canRun);
  if (found === undefined) throw new Error('The page tests need Chromium or Chrome: install one, or set FETTLE_CHROMIUM to its path.');
  return found;
}

/** As findChromium; on a Debian machine where we are root and there is none, installs the package chromium first. */
export function provideChromium(): string {
  try {
    return findChromium();
  } catch (error) {
    const mayInstall = process.getuid?.() === 0 && existsSync('/etc/debian_version') && process.env.FETTLE_CHROMIUM === undefined;
    if (!mayInstall) throw error;
    execFileSync('apt-get', ['update', '-q'], { stdio: 'inherit' });
    execFileSync('apt-get', ['install', '-y', '-q', '--no-install-recommends', 'chromium'], { stdio: 'inherit' });
    return findChromium();
  }
}

function canRun(path: string): boolean {
  try {
    accessSync(path, constants.X_OK);
    return true;
  } catch {
    return false;
  }
}
