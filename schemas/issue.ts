/** What a schema finds wrong, for those who word it. */
import type { z } from 'zod';

export type SchemaIssue = z.core.$ZodIssue;
