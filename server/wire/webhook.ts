import { z } from 'zod';
import { attemptOutcomes, type WebhookRecord } from '../store/webhooks.ts';
import { idSchema, noteSchema, timeSchema } from './common.ts';
import { eventKindSchema } from './event.ts';

const urlSchema = z
  .url({ protocol: /^https?$/ })
  .max(2000)
  .meta({
    description: 'https, unless the operator allows private addresses; no user, no fragment.',
    examples: ['https://club.example/ledger-events'],
  });
const kindsSchema = z
  .array(eventKindSchema)
  .min(1)
  .max(100)
  .nullable()
  .meta({ description: 'Null: all kinds.' });

const facts = { url: urlSchema, kinds: kindsSchema, note: noteSchema };

export const newWebhookSchema = z.strictObject({
  ...facts,
  kinds: kindsSchema.default(null),
  note: noteSchema.default(''),
});
export const webhookEditSchema = z
  .strictObject({
    ...facts,
    active: z.boolean().meta({ description: 'True again: begins with what happens from then on.' }),
  })
  .partial();

export const webhookSchema = z
  .object({
    id: idSchema,
    revision: z.int().min(1).meta({ description: 'Grows by one with each edit.' }),
    created_at: timeSchema,
    updated_at: timeSchema,
    ...facts,
    active: z.boolean().meta({
      description: 'False where it was switched off, by its club or after ten failures in a row.',
    }),
    failures: z.int().min(0).meta({ description: 'Of the event that is waiting, in a row.' }),
    next_attempt_at: timeSchema.nullable(),
    last_attempt: z
      .object({
        at: timeSchema,
        outcome: z.enum(attemptOutcomes),
        status: z.int().nullable().meta({ description: 'Of the answer; null: there was none.' }),
      })
      .nullable(),
  })
  .meta({ id: 'Webhook', description: 'Where the club’s events are sent.' });

export const newWebhookAnswerSchema = z
  .object({
    ...webhookSchema.shape,
    secret: z.string().meta({
      description: 'Signs what is sent. Shown here and never again; it begins with `whsec_`.',
    }),
  })
  .meta({ id: 'NewWebhook' });

/** A webhook as it is sent, without its secret. */
export function webhookToWire(record: WebhookRecord): z.output<typeof webhookSchema> {
  const { id, revision, createdAt, updatedAt, facts: told, progress } = record;
  const { active, failures, nextAttemptAt, lastAttempt } = progress;
  return {
    id,
    revision,
    created_at: createdAt,
    updated_at: updatedAt,
    url: told.url,
    kinds: told.kinds === null ? null : [...told.kinds],
    note: told.note,
    active,
    failures,
    next_attempt_at: nextAttemptAt,
    last_attempt: lastAttempt,
  };
}
