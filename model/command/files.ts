/** Files in and out. Whatever goes wrong with one comes back as a sentence that names it. */
import { randomBytes } from 'node:crypto';
import { accessSync, constants, lstatSync, readFileSync, realpathSync, renameSync, rmSync, type Stats, statSync } from 'node:fs';
import { type FileHandle, open } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { BAD_INPUT, CommandFault, FAILED } from './fault.ts';

const CHUNK_BYTES = 1 << 20;
const SIGNALS = ['SIGINT', 'SIGTERM', 'SIGHUP'] as const;

const WHAT_HAPPENED: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file',
  ENOTDIR: 'part of its path is a file, not a folder',
  EISDIR: 'it is a folder; expected a file',
  EACCES: 'the system does not allow it',
  EPERM: 'the system does not allow it',
  EROFS: 'it is on a disk that cannot be written to',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the space allowed on the disk is used up',
  EFBIG: 'the file is larger than the system allows',
  ENAMETOOLONG: 'its name is too long',
  ELOOP: 'its links lead in a circle',
  ERR_FS_FILE_TOO_LARGE: 'it is larger than 2 GiB',
};

function isSystemError(error: unknown): error is NodeJS.ErrnoException {
  return error instanceof Error && 'code' in error && typeof error.code === 'string';
}

function cannot(what: string, path: string, error: unknown, exitCode: number): unknown {
  if (!isSystemError(error)) return error;
  return new CommandFault(`${path} cannot be ${what}: ${WHAT_HAPPENED[error.code as string] ?? error.message}`, exitCode);
}

export function readBytes(path: string): Uint8Array {
  try {
    return readFileSync(path);
  } catch (error) {
    throw cannot('read', path, error, BAD_INPUT);
  }
}

/** A file of UTF-8 text. */
export function readText(path: string): string {
  const bytes = readBytes(path);
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch (error) {
    if (isSystemError(error) && error.code === 'ERR_ENCODING_INVALID_ENCODED_DATA')
      throw new CommandFault(`${path} is not a text in UTF-8; expected a design`);
    throw error;
  }
}

/** Undefined where there is nothing yet. */
function statOf(path: string): Stats | undefined {
  try {
    return statSync(path, { throwIfNoEntry: false });
  } catch (error) {
    throw cannot('written', path, error, BAD_INPUT);
  }
}

/**
 * Judges where a result is to go before the work is done, and returns the path to write to: a link is followed. Refuses a path that leads,
 * by whatever name or link, to one of the files read.
 */
export function outputPath(path: string, inputs: readonly string[]): string {
  const found = statOf(path);
  if (found?.isDirectory()) throw new CommandFault(`${path} is a folder; expected a file or a new name`);
  if (found && !found.isFile()) throw new CommandFault(`${path} is not a plain file; expected one or a new name`);
  for (const input of inputs) {
    const read = found && statOf(input);
    if (read && read.dev === found.dev && read.ino === found.ino)
      throw new CommandFault(`${path} is the same file as ${input}, which is only read; expected another name`);
  }
  const folder = dirname(path);
  if (!statOf(folder)?.isDirectory()) throw new CommandFault(`${path} cannot be written: there is no folder ${folder}`);
  try {
    accessSync(folder, constants.W_OK);
    if (!found) return path;
    accessSync(path, constants.W_OK);
    return lstatSync(path).isSymbolicLink() ? realpathSync(path) : path;
  } catch (error) {
    throw cannot('written', path, error, BAD_INPUT);
  }
}

/**
 * Writes a file that is whole or not there: under another name in the same folder, then renamed. A failure or a signal removes what
 * was written so far and leaves a file that had the name before as it was.
 */
export async function writeWhole(path: string, bytes: Uint8Array): Promise<void> {
  const part = join(dirname(path), `.fettle-${randomBytes(6).toString('hex')}`);
  const interrupted = (signal: NodeJS.Signals) => {
    rmSync(part, { force: true });
    for (const each of SIGNALS) process.removeListener(each, interrupted);
    process.kill(process.pid, signal);
  };
  for (const signal of SIGNALS) process.on(signal, interrupted);
  try {
    await writePart(await open(part, 'wx'), bytes);
    renameSync(part, path);
  } catch (error) {
    rmSync(part, { force: true });
    throw cannot('written', path, error, FAILED);
  } finally {
    for (const signal of SIGNALS) process.removeListener(signal, interrupted);
  }
}

/** In pieces, so that a signal is heard in between. */
async function writePart(file: FileHandle, bytes: Uint8Array): Promise<void> {
  try {
    for (let at = 0; at < bytes.length; at += CHUNK_BYTES) await file.writeFile(bytes.subarray(at, at + CHUNK_BYTES));
    await file.sync();
  } finally {
    await file.close();
  }
}
