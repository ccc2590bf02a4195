/** Runs the real command as a process of its own, in a folder of its own. */
import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { onTestFinished } from 'vitest';
import type { Control, Design } from '../../../model/design/types.ts';
import { designOf, variantOf } from '../../support/designs.ts';

export const FETTLE = fileURLToPath(new URL('../../../model/command/fettle.mjs', import.meta.url));
export const ROOT = fileURLToPath(new URL('../../..', import.meta.url));

export interface Ended {
  readonly code: number | null;
  readonly signal: NodeJS.Signals | null;
  readonly stdout: string;
  readonly stderr: string;
}

/** Collects what a child says until it has ended. */
export function ended(child: ChildProcess): Promise<Ended> {
  let stdout = '';
  let stderr = '';
  child.stdout?.setEncoding('utf8').on('data', (text) => {
    stdout += text;
  });
  child.stderr?.setEncoding('utf8').on('data', (text) => {
    stderr += text;
  });
  return new Promise((resolve, reject) => {
    child.on('error', reject).on('close', (code, signal) => resolve({ code, signal, stdout, stderr }));
  });
}

export interface Folder {
  readonly path: string;
  at(name: string): string;
  write(name: string, content: string | Uint8Array): void;
  read(name: string): Buffer;
  names(): string[];
  /** Both streams are pipes. */
  fettle(...words: string[]): Promise<Ended>;
}

/** A temporary folder that goes with its test. */
export function newFolder(): Folder {
  const path = mkdtempSync(join(tmpdir(), 'fettle-test-'));
  onTestFinished(() => rmSync(path, { recursive: true, force: true }));
  const at = (name: string) => join(path, name);
  return {
    path,
    at,
    write: (name, content) => writeFileSync(at(name), content),
    read: (name) => readFileSync(at(name)),
    names: () => readdirSync(path).sort(),
    fettle: (...words) => ended(spawn(process.execPath, [FETTLE, ...words], { cwd: path, stdio: ['ignore', 'pipe', 'pipe'] })),
  };
}

/** Cell A with the largest load that a design may have in place of none, and no filter in the way: one step a sample. */
export function cellA(control: Control = { source: 'fixed', controlV: -1.2 }): Design {
  return designOf(variantOf({ loadOhm: 1e9, controlOhm: 1 }, {}, control), { oversampling: 1 });
}

/** The FET cut off, 1 Ω into 1 GΩ: what goes in comes out, but for one part in 1e9. */
export function straightThrough(): Design {
  return designOf(variantOf({ loadOhm: 1e9, seriesOhm: 1 }, {}, { source: 'fixed', controlV: -9 }), { oversampling: 1 });
}
