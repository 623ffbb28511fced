import type { Socket } from 'node:net';
import type { FastifyError, FastifyInstance, FastifyReply, FastifyRequest } from 'fastify';
import { hasZodFastifySchemaValidationErrors } from 'fastify-type-provider-zod';
import {
  Problem,
  type ProblemParts,
  type ProblemPlace,
  problemBody,
  problemKinds,
} from './problems.ts';
import { StoreError, type StoreErrorKind } from './store/port.ts';

/** Makes every error of the instance, the framework's own included, a problem of the catalogue. */
export function answerErrorsAsProblems(app: FastifyInstance, publicUrl: string): void {
  app.setErrorHandler((error, request, reply) => sendError(error, request, reply, publicUrl));
  // Before authentication and body parsing, so that an unknown path is a 404 whatever was sent.
  app.addHook('onRequest', async (request) => {
    if (request.is404) throw unroutedProblem(app, request);
  });
  app.setNotFoundHandler((request) => {
    throw unroutedProblem(app, request);
  });
}

/** Sends any thrown value as a problem; the log gets what the answer must not tell. */
export function sendError(
  error: unknown,
  request: FastifyRequest,
  reply: FastifyReply,
  publicUrl: string,
): FastifyReply {
  const problem = toProblem(error);
  const { status } = problemKinds[problem.slug];
  if (status >= 500) request.log.error({ err: error }, 'request failed');
  const body = problemBody(problem.slug, problem.parts, publicUrl, request.id);
  // An error before the hooks have run has no id yet.
  reply.header('x-request-id', request.id).header('cache-control', 'no-store');
  reply.removeHeader('etag');
  for (const [name, value] of Object.entries(problem.parts.headers ?? {})) {
    reply.header(name, value);
  }
  return reply
    .code(status)
    .type('application/problem+json')
    .send(Buffer.from(JSON.stringify(body)));
}

/** Any thrown value as a problem of the catalogue. */
export function toProblem(error: unknown): Problem {
  if (error instanceof Problem) return error;
  if (error instanceof StoreError) return storeProblem(error);
  if (hasZodFastifySchemaValidationErrors(error)) return validationProblem(error);
  return frameworkProblem(error);
}

const storeProblems: Record<StoreErrorKind, (error: StoreError) => Problem> = {
  conflict: (error) =>
    new Problem('key-in-use', {
      errors: [{ detail: 'This value is in use already.', pointer: `#/${error.field ?? 'key'}` }],
    }),
  stale: () => new Problem('stale'),
  full: () => new Problem('storage-full'),
  corrupt: () => new Problem('record-corrupt'),
  unavailable: () => new Problem('unavailable', { headers: { 'retry-after': '5' } }),
};

function storeProblem(error: StoreError): Problem {
  return storeProblems[error.kind](error);
}

type ValidationFault = Pick<
  NonNullable<FastifyError['validation']>[number],
  'instancePath' | 'message' | 'params'
>;

function validationProblem(error: {
  readonly validation: readonly ValidationFault[];
  readonly validationContext?: string | undefined;
}): Problem {
  const place = placeMaker(error.validationContext ?? 'body');
  const errors = error.validation.flatMap((fault) => faultPlaces(fault, place));
  return new Problem('invalid-request', { errors });
}

type PlaceMaker = (path: string, detail: string) => ProblemPlace;

function placeMaker(context: string): PlaceMaker {
  if (context === 'body') return (path, detail) => ({ detail, pointer: `#${path}` });
  if (context === 'headers') return (path, detail) => ({ detail, header: path.slice(1) });
  return (path, detail) => ({ detail, parameter: path.slice(1) });
}

function faultPlaces(fault: ValidationFault, place: PlaceMaker): ProblemPlace[] {
  const path = fault.instancePath === '/' ? '' : fault.instancePath;
  const unknownKeys = fault.params['keys'];
  if (!Array.isArray(unknownKeys)) return [place(path, fault.message ?? 'Not valid.')];
  return unknownKeys.map((key) =>
    place(`${path}/${pointerToken(String(key))}`, 'There is no such field here.'),
  );
}

/** Escapes a name for a JSON pointer in a URI fragment (RFC 6901, sections 3 and 6). */
function pointerToken(name: string): string {
  return encodeURIComponent(name.replaceAll('~', '~0').replaceAll('/', '~1'));
}

const frameworkSlugs: Record<number, Problem['slug']> = {
  404: 'not-found',
  408: 'request-timeout',
  413: 'too-large',
  414: 'uri-too-long',
  415: 'unsupported-media-type',
  431: 'headers-too-large',
  503: 'unavailable',
};

function frameworkProblem(error: unknown): Problem {
  const { statusCode, code, message } = asFrameworkError(error);
  if (statusCode === undefined || statusCode < 400 || code === undefined) {
    return new Problem('internal');
  }
  const slug = frameworkSlugs[statusCode];
  if (slug === 'unavailable') return storeProblems.unavailable(new StoreError('unavailable', ''));
  if (slug !== undefined) return new Problem(slug);
  if (statusCode >= 500) return new Problem('internal');
  return new Problem('malformed-request', { detail: message });
}

function asFrameworkError(error: unknown): Partial<FastifyError> & { readonly message: string } {
  return error instanceof Error ? error : { message: String(error) };
}

/** Why no route took the request: the path is unknown, or known but not with this method. */
function unroutedProblem(app: FastifyInstance, request: FastifyRequest): Problem {
  const allowed = app.methodsOf(request.url);
  if (allowed.length === 0) return new Problem('not-found');
  return new Problem('method-not-allowed', {
    detail: `${request.method} is not for this path; it takes ${allowed.join(', ')}.`,
    headers: { allow: allowed.join(', ') },
  });
}

/** What is known of a request that never became one: the parser of HTTP refused it. */
export function refuseSocket(
  error: NodeJS.ErrnoException,
  socket: Socket,
  publicUrl: string,
  requestId: string,
): void {
  if (error.code === 'ECONNRESET' || socket.destroyed || !socket.writable) {
    socket.destroy();
    return;
  }
  const slug = socketSlugs[error.code ?? ''] ?? 'malformed-request';
  const kind = problemKinds[slug];
  const parts: ProblemParts = {};
  const body = JSON.stringify(problemBody(slug, parts, publicUrl, requestId));
  socket.end(
    `HTTP/1.1 ${kind.status} ${kind.title}\r\n` +
      'Content-Type: application/problem+json\r\n' +
      `Content-Length: ${Buffer.byteLength(body)}\r\n` +
      `X-Request-Id: ${requestId}\r\n` +
      'Connection: close\r\n\r\n' +
      body,
  );
}

const socketSlugs: Record<string, Problem['slug']> = {
  HPE_HEADER_OVERFLOW: 'headers-too-large',
  ERR_HTTP_REQUEST_TIMEOUT: 'request-timeout',
};
