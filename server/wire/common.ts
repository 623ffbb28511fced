import { z } from 'zod';

/** Schemas that every resource shares. Names of fields carry their unit. */

export const idSchema = z.uuid().meta({
  description: 'UUID version 7 (RFC 9562).',
  examples: ['019ad9a1-7a00-7000-8000-000000000001'],
});

export const keySchema = z
  .string()
  .regex(/^[a-z0-9]+(-[a-z0-9]+)*$/)
  .max(40)
  // An id must stay an id: where either is taken, nothing may be both.
  .refine(
    (key) => !/^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(key),
    'A key must not look like an id.',
  )
  .meta({ description: 'Short name, unique in the club: lower-case letters, digits and hyphens.' });

export const idOrKeySchema = z
  .string()
  .min(1)
  .max(40)
  .meta({ description: 'The id, or the short key.' });

/** A time as it is sent: UTC, milliseconds. */
export const timeSchema = z.iso
  .datetime({ precision: 3 })
  .meta({ description: 'RFC 3339, UTC, milliseconds.' });

/** A time as it is taken: any offset, but never without one; it becomes UTC. */
export const timeInputSchema = z.iso
  .datetime({ offset: true })
  .transform((text) => new Date(text).toISOString())
  .meta({ description: 'RFC 3339 with `Z` or an offset.', examples: ['2026-05-17T14:30:00Z'] });

export const noteSchema = z.string().max(2000);
export const frequencySchema = z.number().nonnegative().meta({ description: 'Hertz.' });

export const inventedSchema = z
  .boolean()
  .meta({ description: 'True for records of the demo club: nothing of it was measured.' });

export const cautionSchema = z
  .object({ code: z.string(), detail: z.string() })
  .meta({ id: 'Caution', description: 'What a person must know beside the numbers.' });

export const assumptionSchema = z
  .object({
    code: z.string(),
    detail: z.string(),
    line: z.int().optional().meta({ description: 'Line of the file, from 1.' }),
  })
  .meta({ id: 'Assumption', description: 'A liberty that was taken in reading the file.' });

const limitSchema = z.coerce
  .number()
  .int()
  .min(1)
  .max(500)
  .default(50)
  .meta({ description: 'How many items a page has at most.' });

const cursorSchema = z
  .string()
  .max(500)
  .optional()
  .meta({ description: 'Goes on where a page ended: `page.next` of that page.' });

/** The query parameters that every list has. */
export const pageQuery = { limit: limitSchema, cursor: cursorSchema };

/** A page of a list, its items of the given schema. */
export function pageSchema<Item extends z.ZodType>(item: Item) {
  return z.object({
    items: z.array(item),
    page: z.object({
      next: z
        .string()
        .nullable()
        .meta({ description: 'The `cursor` of the next page; null on the last one.' }),
      limit: z.int(),
    }),
  });
}

/** What a list's query has to be strict about: nothing unknown. */
export const noQuery = z.strictObject({});

/** Headers of a read that may be answered with 304; every other header passes as well. */
export const readHeaders = z.looseObject({
  'if-none-match': z
    .string()
    .optional()
    .meta({ description: 'The `ETag` of the answer that the client has.' }),
});

/** Headers of an edit. Leaving `If-Match` out is a 428, not a fault of form. */
export const editHeaders = z.looseObject({
  'if-match': z
    .string()
    .optional()
    .meta({ description: 'Needed: the `ETag` of the record as it was read.' }),
});
