/** `accepted.json`: disagreements that a curator has accepted, until a day or until the evidence changes. */
import { z } from 'zod';

const hash = z.string().regex(/^[0-9a-f]{16}$/, 'wanted 16 hexadecimal digits as the findings table prints them');

export const acceptanceSchema = z.strictObject({
  /** The finding's id. */
  finding: hash,
  evidenceHash: hash,
  reason: z.string().trim().min(1),
  by: z.string().trim().min(1),
  date: z.iso.date(),
  /** The last day on which it holds. */
  until: z.iso.date(),
});

export const acceptedSchema = z.array(acceptanceSchema);

export type Acceptance = z.infer<typeof acceptanceSchema>;
