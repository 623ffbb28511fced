import { z } from 'zod';
import { isStillAllowed, principalOf } from '../auth/bearer.ts';
import { EventBroadcast } from '../events/broadcast.ts';
import { EventStream } from '../events/event-stream.ts';
import { EventListener, mostReplayed } from '../events/listener.ts';
import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { toldEventKinds } from '../store/events.ts';
import { noQuery } from '../wire/common.ts';
import { answers, commonProblems } from '../wire/problem.ts';

const heartbeatMs = 15_000;
const comeBackAfterMs = 5_000;

/** The club's events as they happen. */
export function eventRoutes(app: App, service: Service): void {
  const broadcast = new EventBroadcast(service.store, (error) => {
    app.log.error({ err: error }, 'new events could not be read');
  });
  const open = new Map<EventStream, EventListener>();
  const heartbeat = setInterval(() => {
    for (const listener of open.values()) listener.heartbeat();
  }, service.heartbeatMs ?? heartbeatMs).unref();
  // Closing waits for open answers, and these never end by themselves.
  app.addHook('preClose', async () => {
    clearInterval(heartbeat);
    for (const stream of open.keys()) stream.end();
  });

  app.get(
    '/v1/events',
    {
      // Its answer would never end, and nobody would read it.
      exposeHeadRoute: false,
      config: { right: 'read' },
      schema: {
        operationId: 'streamEvents',
        tags: ['events'],
        summary: 'What happens in the club, as it happens',
        description: `Server-sent events. The kinds are ${toldEventKinds.map((kind) => `\`${kind}\``).join(', ')}; the data of each is JSON: \`id\`, \`kind\`, \`at\`, \`subject_id\`, \`antenna_id\` (or null), \`member_id\` (null: the service itself) and \`url\`. With \`Last-Event-ID\` what was missed comes first. Where that is more than ${mostReplayed} events, or the id is not known here, one \`reset\` comes instead: read anew what you show. The stream ends when the token is revoked and when the service stops.`,
        querystring: noQuery,
        headers: z.looseObject({
          'last-event-id': z
            .string()
            .max(100)
            .optional()
            .meta({ description: 'The id of the last event that the client has seen.' }),
        }),
        response: answers(
          {
            200: {
              description: 'Events until either side ends it.',
              content: { 'text/event-stream': { schema: z.string() } },
            },
          },
          commonProblems,
        ),
      },
    },
    async (request, reply) => {
      const stream = new EventStream();
      const listener = new EventListener({
        store: service.store,
        broadcast,
        stream,
        clubId: principalOf(request).clubId,
        publicUrl: service.publicUrl,
        isAllowed: () => isStillAllowed(request, service),
      });
      open.set(stream, listener);
      stream.once('close', () => open.delete(stream));
      stream.retryAfter(comeBackAfterMs);
      await listener.start(request.headers['last-event-id']);
      return reply
        .header('cache-control', 'no-store')
        .header('x-accel-buffering', 'no')
        .type('text/event-stream')
        .send(stream);
    },
  );
}
