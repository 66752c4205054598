/** `corrections.json`: what a raw cell should say, beside the raw file that keeps what it says. */
import { z } from 'zod';

const text = z.string().trim().min(1);
const day = z.iso.date();

export const correctionSchema = z.strictObject({
  /** Path inside the source's folder. */
  file: text,
  /** 1-based, header included. */
  line: z.number().int().min(1),
  /** The header as printed; null: the whole row. */
  column: text.nullable(),
  /** What the cell (or the line) must still say, else the entry is out of date and not applied. */
  printed: z.string(),
  /** null withdraws the cell, or the row where `column` is null. */
  corrected: z.string().nullable(),
  reason: text,
  citation: z.string().optional(),
  who: text,
  date: day,
});

export const correctionsSchema = z.array(correctionSchema);

export type Correction = z.infer<typeof correctionSchema>;
