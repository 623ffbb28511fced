import type { FastifyReply } from 'fastify';
import type { z } from 'zod';
import type { clubSchema } from '../wire/member.ts';
import { type PageParts, page } from './layout.ts';
import type { MemberApi } from './member-api.ts';

/** Sends a page to a member who is signed in, with the name of the club on it. */
export async function sendPage(
  api: MemberApi,
  reply: FastifyReply,
  parts: PageParts,
): Promise<FastifyReply> {
  const club = await api.read<z.output<typeof clubSchema>>('/v1/club');
  const viewer = { clubName: club.name, invented: club.invented };
  return reply.type('text/html; charset=utf-8').send(page({ ...parts, viewer }));
}
