/** `contents.json`: size and SHA-256 of every file of a release and of every input. Itself it does not list. */
import { z } from 'zod';

const sha256 = z.string().regex(/^[0-9a-f]{64}$/);
const bytes = z.number().int().nonnegative();

export const fileRecordSchema = z.strictObject({
  /** Path inside the release's folder, with forward slashes. */
  path: z.string().min(1),
  bytes,
  sha256,
  /** Rows of a table file; null for every other. */
  rows: z.number().int().nonnegative().nullable(),
});

export const inputFileSchema = z.strictObject({
  /** '' for files that belong to no source: the list of substances, the policy. */
  source: z.string(),
  file: z.string().min(1),
  bytes,
  sha256,
  citation: z.string().nullable(),
  licence: z.string().nullable(),
  basis: z.enum(['measured', 'evaluated', 'computed', 'estimated']).nullable(),
});

export const contentsSchema = z.strictObject({
  release: z.string().min(1),
  contentId: sha256,
  version: z.string(),
  files: z.array(fileRecordSchema),
  inputs: z.array(inputFileSchema.pick({ source: true, file: true, bytes: true, sha256: true })),
});

export type FileRecord = Readonly<z.infer<typeof fileRecordSchema>>;
export type InputFile = Readonly<z.infer<typeof inputFileSchema>>;
export type Contents = z.infer<typeof contentsSchema>;
