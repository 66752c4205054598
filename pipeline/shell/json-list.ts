import {
  closeSync,
  existsSync,
  fsyncSync,
  openSync,
  readFileSync,
  realpathSync,
  renameSync,
  rmSync,
  statSync,
  writeSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { Stop } from './exit-status.js';

/** A JSON file that holds a list of entries, as it stands. */
export interface JsonList {
  readonly path: string;
  /** null: there is no file yet. */
  readonly text: string | null;
  readonly entries: readonly unknown[];
}

/** Reads it. Throws a `Stop` where the file is there and is no list: it is not for us to replace what somebody wrote. */
export function readJsonList(path: string): JsonList {
  if (!existsSync(path)) return { path, text: null, entries: [] };
  const text = new TextDecoder('utf-8', { ignoreBOM: true }).decode(readFileSync(path));
  const refuse = (why: string): Stop =>
    new Stop(`${path} cannot be added to: ${why}.`, 'Mend the file, then run the command again. Nothing was written.');
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\uFEFF/, ''));
  } catch (error) {
    throw refuse((error as Error).message);
  }
  if (!Array.isArray(value)) throw refuse('it holds no list in square brackets');
  return { path, text, entries: value };
}

/**
 * The text with `entry` at its end. What stands there keeps its bytes, its indent and its line ends, unless `replaces`
 * holds for an older entry: then that one is left out and the list is set anew.
 */
export function withEntry(list: JsonList, entry: object, replaces: (old: unknown) => boolean = () => false): string {
  const { text, entries } = list;
  const kept = entries.filter((old) => !replaces(old));
  const indent = /^([ \t]+)\S/m.exec(text ?? '')?.[1] ?? '  ';
  const end = text?.includes('\r\n') ? '\r\n' : '\n';
  const mark = text?.startsWith('\uFEFF') ? '\uFEFF' : '';
  const set = (value: unknown): string => JSON.stringify(value, null, indent).replaceAll('\n', end);
  if (text === null || kept.length === 0 || kept.length < entries.length)
    return `${mark}${set([...kept, entry])}${end}`;
  const close = text.lastIndexOf(']');
  const head = text.slice(0, close).trimEnd();
  const added = set(entry)
    .split(end)
    .map((line) => `${indent}${line}`)
    .join(end);
  return `${head},${end}${added}${end}${text.slice(close)}`;
}

/** Writes beside the file and moves it there, so that no reader meets half of it. Its permissions are kept. */
export function writeAtomically(path: string, text: string): void {
  const target = existsSync(path) ? realpathSync(path) : path;
  const draft = join(dirname(target), `.${process.pid}.draft.json`);
  const mode = existsSync(target) ? statSync(target).mode & 0o777 : 0o666;
  try {
    const handle = openSync(draft, 'wx', mode);
    try {
      const bytes = new TextEncoder().encode(text);
      for (let at = 0; at < bytes.length; ) at += writeSync(handle, bytes, at);
      fsyncSync(handle);
    } finally {
      closeSync(handle);
    }
    renameSync(draft, target);
  } catch (error) {
    rmSync(draft, { force: true });
    throw error;
  }
}
