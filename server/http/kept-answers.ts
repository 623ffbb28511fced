import type { FastifyReply, FastifyRequest } from 'fastify';
import { principalOf } from '../auth/bearer.ts';
import type { Store } from '../store/port.ts';
import { isNotModified } from './conditional.ts';

/** An answer that follows from records alone: its tag is known before its text is made. */
export interface TaggedAnswer {
  readonly tag: string;
  readonly text: () => Promise<string | Uint8Array>;
}

const mostBytes = 16 * 1024 * 1024;
const mostUrls = 10_000;
const jsonType = 'application/json; charset=utf-8';

/**
 * Answers that were sent lately, so that a dashboard that asks again costs no more than sending
 * them. A URL leads to its tag for as long as nothing at all was written to the store; a tag leads
 * to its text for good, since a strong tag never stands for two texts.
 */
export class KeptAnswers {
  private readonly store: Store;
  private version = -1;
  private readonly tagOfUrl = new Map<string, string>();
  private readonly textOfTag = new Map<string, Buffer>();
  private bytes = 0;

  constructor(store: Store) {
    this.store = store;
  }

  /** Sends what this URL stands for as this media type at present, or 304 where the client has it. */
  async send(
    request: FastifyRequest,
    reply: FastifyReply,
    find: () => Promise<TaggedAnswer>,
    type = jsonType,
  ): Promise<FastifyReply> {
    return this.sendOf(principalOf(request).clubId, request, reply, find, type);
  }

  /** The same of the club that is named, where nobody needs to be known. */
  async sendOf(
    clubId: string,
    request: FastifyRequest,
    reply: FastifyReply,
    find: () => Promise<TaggedAnswer>,
    type = jsonType,
  ): Promise<FastifyReply> {
    // Whoever may ask for a URL sees no more of the club than another who may.
    const url = `${clubId} ${type} ${request.url}`;
    const known = this.knownTag(url);
    const text = known === undefined ? undefined : this.textOfTag.get(known);
    if (known !== undefined && isNotModified(request, reply, known)) return reply.code(304).send();
    if (text !== undefined) return reply.type(type).send(text);

    // What is written from here on may or may not be in the answer: it is not kept for that URL.
    const { version } = this;
    const { tag, text: make } = await find();
    if (version === this.store.version()) this.keepTag(url, tag);
    if (isNotModified(request, reply, tag)) return reply.code(304).send();
    const kept = this.textOfTag.get(tag) ?? Buffer.from(await make());
    this.keepText(tag, kept);
    return reply.type(type).send(kept);
  }

  private knownTag(url: string): string | undefined {
    const version = this.store.version();
    if (version !== this.version) {
      this.tagOfUrl.clear();
      this.version = version;
    }
    return this.tagOfUrl.get(url);
  }

  private keepTag(url: string, tag: string): void {
    if (this.tagOfUrl.size >= mostUrls) this.tagOfUrl.clear();
    this.tagOfUrl.set(url, tag);
  }

  /** Those made longest ago go first. */
  private keepText(tag: string, text: Buffer): void {
    this.bytes -= this.textOfTag.get(tag)?.length ?? 0;
    this.textOfTag.delete(tag);
    this.textOfTag.set(tag, text);
    this.bytes += text.length;
    for (const [oldest, { length }] of this.textOfTag) {
      if (this.bytes <= mostBytes) return;
      this.textOfTag.delete(oldest);
      this.bytes -= length;
    }
  }
}
