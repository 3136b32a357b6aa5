import { z } from 'zod';
import { id, instantText } from '../common.js';

export const auditEntry = z.object({
  id,
  at: instantText,
  actor: z.string(),
  action: z.string().describe('subject.verb, such as rover.assigned'),
  subject: z.string().describe('What was changed, in words'),
  before: z.record(z.string(), z.unknown()).nullable(),
  after: z.record(z.string(), z.unknown()).nullable(),
});
export type AuditEntry = z.infer<typeof auditEntry>;
export const auditList = z.object({ entries: z.array(auditEntry), nextBefore: id.nullable() });
export type AuditList = z.infer<typeof auditList>;
export const auditQuery = z.object({ before: z.coerce.number().int().positive().optional() });
