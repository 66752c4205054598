/** Size and SHA-256 of files, and the files of a folder. */
import { createHash } from 'node:crypto';
import { createReadStream, readdirSync, statSync } from 'node:fs';
import { open, readdir } from 'node:fs/promises';
import { join, relative, sep } from 'node:path';
import type { FileRecord } from '../../schemas/contents.js';

/** `path` in the record is relative to `folder`. */
export async function recordOf(folder: string, path: string, rows: number | null): Promise<FileRecord> {
  const hash = createHash('sha256');
  let bytes = 0;
  for await (const chunk of createReadStream(join(folder, path), { highWaterMark: 1 << 20 })) {
    hash.update(chunk as Buffer);
    bytes += (chunk as Buffer).length;
  }
  return { path, bytes, sha256: hash.digest('hex'), rows };
}

/** Every file below the folder, sorted; paths relative to it, with forward slashes. Links and the like count as files. */
export async function filesIn(folder: string): Promise<string[]> {
  const entries = await readdir(folder, { recursive: true, withFileTypes: true });
  return entries
    .filter((entry) => !entry.isDirectory())
    .map((entry) => relative(folder, join(entry.parentPath, entry.name)).split(sep).join('/'))
    .sort();
}

/** Bytes of all files below the folder; 0 where it cannot be read: whoever reads it says so. */
export function folderBytes(folder: string): number {
  let bytes = 0;
  try {
    for (const entry of readdirSync(folder, { recursive: true, withFileTypes: true })) {
      if (entry.isFile()) bytes += statSync(join(entry.parentPath, entry.name)).size;
    }
  } catch {
    return 0;
  }
  return bytes;
}

/** Waits until the file's bytes, or the folder's entries, are on the disk. */
export async function sync(path: string): Promise<void> {
  const handle = await open(path, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}
