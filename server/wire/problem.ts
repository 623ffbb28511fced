import { z } from 'zod';
import { type ProblemSlug, problemKinds } from '../problems.ts';

const placeSchema = z.object({
  detail: z.string(),
  pointer: z.string().optional().meta({ description: 'JSON pointer into the body.' }),
  parameter: z.string().optional().meta({ description: 'Query or path parameter.' }),
  header: z.string().optional(),
  line: z.int().min(1).optional().meta({ description: 'Line of the uploaded file, from 1.' }),
  column: z.int().min(1).optional().meta({ description: 'Column of that line, from 1.' }),
});

const proposalSchema = z.object({
  columns: z.string().meta({ description: 'Send this back as the `columns` parameter.' }),
  evidence: z.array(z.string()),
  first_rows: z.array(z.array(z.string())),
});

/** An error answer (RFC 9457). */
export const problemSchema = z
  .object({
    type: z.url().meta({ description: 'Names the kind of problem; a page stands behind it.' }),
    title: z.string(),
    status: z.int(),
    detail: z.string(),
    instance: z.string().meta({ description: '`urn:uuid:` and the id of the request.' }),
    errors: z.array(placeSchema).max(100).optional(),
    errors_truncated: z.literal(true).optional(),
    code: z
      .string()
      .optional()
      .meta({ description: 'What exactly was found: of the file, the cable, the line.' }),
    remedy: z.string().optional(),
    proposal: proposalSchema.optional(),
    existing: z
      .object({ sweep_id: z.string(), antenna_id: z.string(), url: z.string() })
      .optional()
      .meta({ description: 'The record that stands in the way.' }),
  })
  .meta({ id: 'Problem', description: 'RFC 9457.' });

interface Answer {
  readonly description: string;
  readonly content?: Readonly<Record<string, { readonly schema: z.ZodType }>>;
}

/** What a client that has the present answer already is told. */
export const notModified = {
  304: z.undefined().describe('The client has it already: `If-None-Match` names its tag.'),
};

/** The problems that any operation behind a token may answer with. */
export const commonProblems: readonly ProblemSlug[] = [
  'invalid-request',
  'malformed-request',
  'token-in-url',
  'unauthenticated',
  'insufficient-right',
  'too-many-requests',
  'uri-too-long',
  'headers-too-large',
  'internal',
  'unavailable',
];

/**
 * The `response` part of a route's schema: its own answers, and its problems gathered by status
 * with their slugs in the description, so that the document names each one.
 */
export function answers(
  own: Readonly<Record<number, Answer | z.ZodType>>,
  problems: readonly ProblemSlug[],
): Record<number, Answer | z.ZodType> {
  const slugsByStatus = new Map<number, ProblemSlug[]>();
  for (const slug of new Set(problems)) {
    const { status } = problemKinds[slug];
    slugsByStatus.set(status, [...(slugsByStatus.get(status) ?? []), slug]);
  }
  const all: Record<number, Answer | z.ZodType> = { ...own };
  for (const [status, slugs] of slugsByStatus) {
    all[status] = {
      description: slugs.map((slug) => `${problemKinds[slug].title} (\`${slug}\`).`).join(' '),
      content: { 'application/problem+json': { schema: problemSchema } },
    };
  }
  return all;
}

/** An answer in JSON. */
export function jsonAnswer(description: string, schema: z.ZodType): Answer {
  return { description, content: { 'application/json': { schema } } };
}
