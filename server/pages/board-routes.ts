import { Readable } from 'node:stream';
import type { App } from '../http/app-type.ts';
import type { DueWire } from '../routes/due.ts';
import { type BoardParts, boardPage } from './board-page.ts';
import { hidden } from './hidden.ts';
import { MemberApi, Refusal } from './member-api.ts';
import { texts } from './texts.ts';
import { sendPage } from './viewer.ts';

/** The board of the club, and what tells it of changes. */
export function boardRoutes(scope: App): void {
  scope.get('/', hidden, async (request, reply) => {
    const api = new MemberApi(scope, request);
    const [board, due] = await Promise.all([
      api.read<Pick<BoardParts, 'sites'>>('/v1/dashboard'),
      api.read<{ items: readonly DueWire[] }>('/v1/due'),
    ]);
    const body = boardPage({
      sites: board.sites,
      due: new Map(due.items.map((one) => [one.antenna_id, one])),
    });
    return sendPage(api, reply, { title: texts.board.title, path: '/', body });
  });

  scope.get('/board/events', { ...hidden, exposeHeadRoute: false }, async (request, reply) => {
    const left = new AbortController();
    reply.raw.once('close', () => left.abort());
    const lastId = request.headers['last-event-id'];
    const answer = await new MemberApi(scope, request).open('/v1/events', left.signal, {
      ...(typeof lastId === 'string' ? { 'last-event-id': lastId } : {}),
    });
    if (answer.status >= 400) {
      const text = Buffer.concat(await Readable.from(answer.stream).toArray()).toString();
      throw new Refusal(JSON.parse(text));
    }
    // The reader's going away ends the inner answer, which is no fault.
    answer.stream.on('error', () => undefined);
    return reply
      .header('cache-control', 'no-store')
      .header('x-accel-buffering', 'no')
      .type('text/event-stream')
      .send(answer.stream);
  });
}
