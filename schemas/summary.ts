/** `summary.json`: the release in short. The only file of a release, besides the report, that holds its date. */
import { z } from 'zod';

const count = z.number().int().nonnegative();
export const verdictSchema = z.enum(['cleared', 'flagged', 'withheld']);

export const summarySchema = z.strictObject({
  release: z.string().min(1),
  contentId: z.string(),
  version: z.string(),
  /** ISO 8601 day. */
  date: z.string().regex(/^\d{4}-\d{2}-\d{2}$/),
  counts: z.strictObject({
    substances: count,
    cleared: count,
    flagged: count,
    withheld: count,
    faults: count,
    doubts: count,
    notes: count,
    accepted: count,
    rows: z.record(z.string(), count),
  }),
  verdicts: z.record(z.string(), verdictSchema),
  changes: z.strictObject({
    /** The release that was current when this one was made. */
    since: z.string().nullable(),
    verdicts: z.array(z.strictObject({ substance: z.string(), from: verdictSchema, to: verdictSchema })),
    added: z.array(z.string()),
    removed: z.array(z.string()),
  }),
});

export type Verdict = z.infer<typeof verdictSchema>;
export type Summary = z.infer<typeof summarySchema>;
