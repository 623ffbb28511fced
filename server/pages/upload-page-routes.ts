import type { FastifyReply, FastifyRequest } from 'fastify';
import { z } from 'zod';
import type { App } from '../http/app-type.ts';
import { bodyBytes, parseForm } from '../http/upload-body.ts';
import type { Service } from '../service.ts';
import type { problemSchema } from '../wire/problem.ts';
import { type ColumnsProposal, columnsOf } from './columns-form.ts';
import { hidden } from './hidden.ts';
import { MemberApi, Refusal } from './member-api.ts';
import { isOwnForm } from './own-form.ts';
import { refuseForeignForm } from './sign-in-routes.ts';
import { texts } from './texts.ts';
import { type UploadPageParts, uploadPage } from './upload-page.ts';
import { sendPage } from './viewer.ts';

type Problem = z.output<typeof problemSchema>;
type Lists = Pick<UploadPageParts, 'antennas' | 'analyzers'>;

const querystring = z.object({ antenna: z.string().max(40).default('') });
/** A file up to this travels in the form that asks about its columns. */
const mostKeptBytes = 1_000_000;
/** Base64 needs four bytes for three; the other fields are small. */
const formShare = 1.4;
const otherFieldsBytes = 64 * 1024;

const proposalSchema = z.object({
  columns: z.string().max(4000),
  evidence: z.array(z.string()),
  rows: z.array(z.array(z.string())),
});

/** The fields that go into the query of an upload by their own name. */
const toldFields = [
  'analyzer',
  'plane',
  'weather',
  'temperature_c',
  'wind_m_s',
  'ground',
  'conditions',
  'note',
] as const;

/** The upload of a file by a form. */
export function uploadPageRoutes(scope: App, { limits }: Service): void {
  scope.get(
    '/upload',
    { ...hidden, schema: { ...hidden.schema, querystring } },
    async (request, reply) => {
      const filled = new Map([['antenna', request.query.antenna]]);
      const fresh = { filled, problem: null, proposal: null, sent: null };
      return showForm(new MemberApi(scope, request), reply, fresh);
    },
  );

  const bodyLimit = Math.ceil(limits.maxBytes * formShare) + otherFieldsBytes;
  scope.post('/upload', { ...hidden, bodyLimit }, async (request, reply) => {
    if (!isOwnForm(request)) return refuseForeignForm(reply);
    return takeForm(new MemberApi(scope, request), request, reply);
  });
}

async function takeForm(
  api: MemberApi,
  request: FastifyRequest,
  reply: FastifyReply,
): Promise<FastifyReply> {
  const form = await parseForm(bodyBytes(request), request.headers['content-type'] ?? '');
  const { name, bytes } = await fileOf(form);
  const antenna = encodeURIComponent(textOf(form, 'antenna'));
  const query = queryOf(form, name);
  const answer = await api.send('POST', `/v1/antennas/${antenna}/sweeps?${query}`, bytes);
  const body = JSON.parse(answer.bytes.toString());
  if (answer.status < 300) {
    const arrival = answer.status === 201 ? 'kept' : 'known';
    return reply.redirect(`/sweeps/${body.id}?arrival=${arrival}`, 303);
  }
  const problem: Problem = body;
  if (problem.status === 401) throw new Refusal(problem);
  const proposal = proposalFor(problem, form);
  const kept = bytes.length <= mostKeptBytes ? Buffer.from(bytes).toString('base64') : null;
  return showForm(api, reply.code(problem.status), {
    filled: filledIn(form),
    problem,
    proposal,
    sent: proposal === null ? null : { name, kept },
  });
}

async function showForm(
  api: MemberApi,
  reply: FastifyReply,
  parts: Omit<UploadPageParts, keyof Lists>,
): Promise<FastifyReply> {
  const [antennas, analyzers] = await Promise.all([
    api.read<{ items: Lists['antennas'] }>('/v1/antennas?limit=500'),
    api.read<{ items: Lists['analyzers'] }>('/v1/analyzers?limit=500'),
  ]);
  const body = uploadPage({ ...parts, antennas: antennas.items, analyzers: analyzers.items });
  return sendPage(api, reply, { title: texts.upload.title, path: '/upload', body });
}

/** The file that was chosen, or the one that travelled in the form. */
async function fileOf(form: FormData): Promise<{ name: string; bytes: Uint8Array }> {
  const file = form.get('file');
  if (file instanceof File && file.size > 0) {
    return { name: file.name, bytes: new Uint8Array(await file.arrayBuffer()) };
  }
  const kept = Buffer.from(textOf(form, 'kept_file'), 'base64');
  return { name: textOf(form, 'kept_name'), bytes: kept };
}

function queryOf(form: FormData, fileName: string): URLSearchParams {
  const query = new URLSearchParams();
  const tell = (name: string, value: string) => {
    if (value !== '') query.set(name, value);
  };
  for (const name of toldFields) tell(name, textOf(form, name).trim());
  const local = textOf(form, 'measured_at');
  const asUtc = local === '' ? '' : `${local.padEnd(19, ':00').slice(0, 19)}Z`;
  tell('measured_at', textOf(form, 'measured_at_utc') || asUtc);
  tell('file_name', fileName.slice(0, 255));
  tell('columns', columnsOf(form) ?? '');
  return query;
}

/** What to ask about the columns: the service's proposal, or the member's own that was refused. */
function proposalFor({ proposal }: Problem, form: FormData): ColumnsProposal | null {
  if (proposal !== undefined) {
    const { columns, evidence, first_rows: rows } = proposal;
    return { columns, evidence, rows };
  }
  const columns = columnsOf(form);
  if (columns === null) return null;
  try {
    return { ...proposalSchema.parse(JSON.parse(textOf(form, 'proposal'))), columns };
  } catch {
    return null;
  }
}

function filledIn(form: FormData): ReadonlyMap<string, string> {
  const names = ['antenna', 'measured_at', ...toldFields];
  return new Map(names.map((name) => [name, textOf(form, name)]));
}

function textOf(form: FormData, name: string): string {
  const value = form.get(name);
  return typeof value === 'string' ? value : '';
}
