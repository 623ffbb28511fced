import { z } from 'zod';
import { type Right, rights, roles } from '../rights.ts';
import type { ClubState, MemberRecord, MemberToken } from '../store/people.ts';
import { idSchema, inventedSchema, keySchema, timeSchema } from './common.ts';

const lineSchema = (longest: number) =>
  z
    .string()
    .min(1)
    .max(longest)
    .regex(/^[^\p{Cc}]*$/u, 'No control characters.');

export const clubNameSchema = lineSchema(100).meta({ description: 'What the club is called.' });

export const roleSchema = z.enum(roles).meta({
  description:
    '`reader` reads; `measurer` uploads as well, and keeps own analyzers; `keeper` keeps sites, antennas, analyzers and cables, and corrects; `steward` administers people and the club.',
});

export const personSchema = z
  .strictObject({
    name: lineSchema(100),
    call_sign: lineSchema(20).nullable().default(null),
    contact: lineSchema(200)
      .nullable()
      .default(null)
      .meta({ description: 'How to reach them; in any form.' }),
  })
  .meta({ description: 'All that tells who they are; erasing the member deletes it.' });

export const shownAsSchema = z
  .enum(['name', 'pseudonym'])
  .meta({ description: 'What the club sees them as.' });

export const memberSchema = z
  .object({
    id: idSchema,
    revision: z.int().min(1),
    created_at: timeSchema,
    updated_at: timeSchema,
    role: roleSchema,
    active: z.boolean().meta({ description: 'False once they have left: no token is valid.' }),
    shown_as: shownAsSchema,
    shown_name: z.string().meta({ description: 'The name or the pseudonym, as `shown_as` says.' }),
    pseudonym: z.string(),
    person: z
      .object({
        name: z.string(),
        call_sign: z.string().nullable(),
        contact: z.string().nullable(),
      })
      .nullable()
      .meta({
        description:
          'For the member and for stewards; null for others, and where nothing is known.',
      }),
    erased_at: timeSchema.nullable(),
  })
  .meta({ id: 'Member', description: 'Somebody of the club. Records name them by `id` alone.' });

/** The member; the person only where the asker may see it. */
export function memberToWire(
  { facts, ...record }: MemberRecord,
  seesPerson: boolean,
): z.output<typeof memberSchema> {
  const { person, role, active, shownAs } = facts;
  return {
    id: record.id,
    revision: record.revision,
    created_at: record.createdAt,
    updated_at: record.updatedAt,
    role,
    active,
    shown_as: shownAs,
    shown_name: shownAs === 'name' && person !== null ? person.name : record.pseudonym,
    pseudonym: record.pseudonym,
    person:
      seesPerson && person !== null
        ? { name: person.name, call_sign: person.callSign, contact: person.contact }
        : null,
    erased_at: record.erasedAt,
  };
}

export const rightSchema = z
  .enum(rights)
  .meta({ id: 'Right', description: 'What a token may do.' });

export const tokenLabelSchema = lineSchema(100).meta({ examples: ['Laptop in the hut'] });

const tokenFields = {
  id: idSchema,
  member: idSchema,
  label: z.string().meta({ description: 'Empty once the member is erased.' }),
  scopes: z
    .array(rightSchema)
    .nullable()
    .meta({ description: 'Narrows the role; null: all that the role has.' }),
  created_at: timeSchema,
  expires_at: timeSchema.nullable().meta({ description: 'Null: it does not expire.' }),
  revoked_at: timeSchema.nullable(),
  last_used_at: timeSchema.nullable().meta({ description: 'To within five minutes.' }),
};
export const tokenSchema = z
  .object(tokenFields)
  .meta({ id: 'Token', description: 'A token of a member. Its secret is not kept.' });
export const newTokenSchema = z
  .object({
    ...tokenFields,
    token: z.string().meta({ description: 'The token itself, shown this once.' }),
  })
  .meta({ id: 'NewToken' });

export function tokenToWire(token: MemberToken): z.output<typeof tokenSchema> {
  const scopes: readonly Right[] | null = token.scopes;
  return {
    id: token.id,
    member: token.memberId,
    label: token.label,
    scopes: scopes === null ? null : [...scopes],
    created_at: token.createdAt,
    expires_at: token.expiresAt,
    revoked_at: token.revokedAt,
    last_used_at: token.lastUsedAt,
  };
}

export const clubSchema = z
  .object({
    id: idSchema,
    key: keySchema,
    revision: z.int().min(1),
    created_at: timeSchema,
    updated_at: timeSchema,
    name: clubNameSchema,
    public_dashboard: z.boolean().meta({
      description: 'Whether anybody may see the dashboard without a token. It names no member.',
    }),
    invented: inventedSchema,
  })
  .meta({ id: 'Club', description: 'The club that the token is of.' });

export function clubToWire({ facts, ...club }: ClubState): z.output<typeof clubSchema> {
  return {
    id: club.id,
    key: club.key,
    revision: club.revision,
    created_at: club.createdAt,
    updated_at: club.updatedAt,
    name: facts.name,
    public_dashboard: facts.publicDashboard,
    invented: club.invented,
  };
}
