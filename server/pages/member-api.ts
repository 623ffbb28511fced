import type { Readable } from 'node:stream';
import type { FastifyReply, FastifyRequest } from 'fastify';
import type { z } from 'zod';
import type { App } from '../http/app-type.ts';
import type { problemSchema } from '../wire/problem.ts';
import { signInToken } from './sign-in-cookie.ts';

export type ProblemBody = z.output<typeof problemSchema>;

/** What the interface answered with instead of what a page needs. */
export class Refusal extends Error {
  override readonly name = 'Refusal';
  readonly problem: ProblemBody;

  constructor(problem: ProblemBody) {
    super(problem.detail);
    this.problem = problem;
  }
}

/** An answer of the interface, its body unread. */
export interface Answer {
  readonly status: number;
  readonly headers: Readonly<Record<string, unknown>>;
  readonly bytes: Buffer;
}

/**
 * The interface as the member who looks at a page may use it: each call goes through its route with
 * the token of the member's cookie, so a page can show nothing that the token could not read.
 */
export class MemberApi {
  private readonly app: App;
  private readonly request: FastifyRequest;
  private readonly token: string | null;

  constructor(app: App, request: FastifyRequest, token = signInToken(request)) {
    this.app = app;
    this.request = request;
    this.token = token;
  }

  /** The body of a successful GET. Throws `Refusal`. */
  async read<Body>(path: string): Promise<Body> {
    const answer = await this.send('GET', path);
    if (answer.status >= 400) throw new Refusal(JSON.parse(answer.bytes.toString()));
    return JSON.parse(answer.bytes.toString());
  }

  /** A GET whose answer is read as it comes; `signal` ends it. */
  async open(
    url: string,
    signal: AbortSignal,
    more: Readonly<Record<string, string>>,
  ): Promise<{ readonly status: number; readonly stream: Readable }> {
    const answer = await this.app.inject({
      method: 'GET',
      url,
      signal,
      payloadAsStream: true,
      remoteAddress: this.request.ip,
      headers: { ...more, ...this.authorization() },
    });
    return { status: answer.statusCode, stream: answer.stream() };
  }

  /** Any call; the answer is as it came. */
  async send(
    method: 'GET' | 'POST',
    url: string,
    body?: Uint8Array,
    more: Readonly<Record<string, string>> = {},
  ): Promise<Answer> {
    const { statusCode, headers, rawPayload } = await this.app.inject({
      method,
      url,
      remoteAddress: this.request.ip,
      headers: {
        ...more,
        ...this.authorization(),
        ...(body === undefined ? {} : { 'content-type': 'application/octet-stream' }),
      },
      ...(body === undefined ? {} : { payload: Buffer.from(body) }),
    });
    return { status: statusCode, headers, bytes: rawPayload };
  }

  private authorization(): Readonly<Record<string, string>> {
    return this.token === null ? {} : { authorization: `Bearer ${this.token}` };
  }
}

const passedOn = ['content-type', 'content-disposition', 'content-security-policy', 'etag'];

/** Hands an answer of the interface on as it is: a file, a picture. Throws `Refusal`. */
export function handOn(reply: FastifyReply, { status, headers, bytes }: Answer): FastifyReply {
  if (status >= 400) throw new Refusal(JSON.parse(bytes.toString()));
  for (const name of passedOn) {
    const value = headers[name];
    if (typeof value === 'string') reply.header(name, value);
  }
  return reply.code(status).header('cache-control', 'private, no-cache').send(bytes);
}
