import { z } from 'zod';
import { columnsGrammar } from '../../core/formats/delimited/columns-grammar.ts';
import type { ProblemSlug } from '../problems.ts';
import { sampleFile } from '../sample-file.ts';
import { timeInputSchema } from './common.ts';
import { commonProblems } from './problem.ts';

const columnsDescription = `What the columns of delimited text hold.

\`\`\`
${columnsGrammar}
\`\`\``;

/** What every upload may say of its file, as query parameters. */
export const fileQuery = {
  measured_at: timeInputSchema.optional(),
  note: z.string().max(2000).default(''),
  columns: z.string().max(2000).optional().meta({ description: columnsDescription }),
  port: z
    .enum(['1', '2'])
    .transform((port): 1 | 2 => (port === '1' ? 1 : 2))
    .optional()
    .meta({ description: 'Which port of a two-port file was measured.' }),
  file_name: z.string().min(1).max(255).optional(),
};

export const uploadHeaders = z.looseObject({
  'content-digest': z.string().optional().meta({
    description: 'RFC 9530, `sha-256=:<base64>:`: checked against the bytes of the body.',
  }),
});

const binary = { type: 'string', format: 'binary' };

/** The body of an upload, for the document. */
export const fileRequestBody = {
  description:
    'The file itself, under any content type, or a form with one part `file`. What kind of file it is is told from its content. It may be packed by gzip (also as `Content-Encoding: gzip`) or as a ZIP archive of one file: the file inside is kept.',
  required: true,
  content: {
    'application/octet-stream': { schema: binary, example: sampleFile },
    'multipart/form-data': {
      schema: { type: 'object', required: ['file'], properties: { file: binary } },
    },
  },
};

/** What can go wrong with any upload. */
export const uploadProblems: readonly ProblemSlug[] = [
  ...commonProblems,
  'not-found',
  'digest-mismatch',
  'digest-unsupported',
  'too-large',
  'unsupported-media-type',
  'unknown-file-kind',
  'unreadable-file',
  'columns-to-confirm',
  'implausible-fact',
  'storage-full',
];
