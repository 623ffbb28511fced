import { z } from 'zod';
import type { Editable } from '../store/port.ts';
import { idSchema, keySchema, timeSchema } from './common.ts';

/** The fields that every site, antenna and analyzer answers with, beside its facts. */
export const editableFields = {
  id: idSchema,
  key: keySchema,
  revision: z.int().min(1).meta({ description: 'Grows by one with each edit.' }),
  created_at: timeSchema,
  updated_at: timeSchema,
};

export function editableToWire(record: Editable<unknown>) {
  return {
    id: record.id,
    key: record.key,
    revision: record.revision,
    created_at: record.createdAt,
    updated_at: record.updatedAt,
  };
}

/** The facts with those edits laid over them that were given. */
export function withEdits<Facts extends object>(
  facts: Facts,
  edits: { readonly [Name in keyof Facts]?: Facts[Name] | undefined },
): Facts {
  const given = Object.entries(edits).filter(([, value]) => value !== undefined);
  return { ...facts, ...Object.fromEntries(given) };
}
