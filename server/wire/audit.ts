import { z } from 'zod';
import type { AuditEntry } from '../store/audit.ts';
import { timeSchema } from './common.ts';

export const auditEntrySchema = z
  .object({
    seq: z.int().min(1).meta({ description: 'Over all clubs of the service.' }),
    at: timeSchema,
    member_id: z.string().nullable().meta({ description: 'Null: the service itself.' }),
    act: z.string().meta({ examples: ['sweep_added'] }),
    subject_id: z.string().meta({ description: 'What it was done to.' }),
    outcome: z.string().meta({ description: '`done`, or the problem that it was refused with.' }),
    address: z.string().nullable().meta({
      description: 'Where it came from; null: the service itself, or erased with the member.',
    }),
    hash: z
      .string()
      .regex(/^[0-9a-f]{64}$/)
      .meta({
        description: 'SHA-256 over the hash of the entry before and this one’s content.',
      }),
  })
  .meta({ id: 'AuditEntry', description: 'Who did what, when and from where.' });

export function auditEntryToWire(entry: AuditEntry): z.output<typeof auditEntrySchema> {
  const { seq, at, memberId, act, subjectId, outcome, address, hash } = entry;
  const member_id = memberId === '' ? null : memberId;
  return { seq, at, member_id, act, subject_id: subjectId, outcome, address, hash };
}
