import type { FastifyInstance } from 'fastify';
import { type DestinationStream, type Logger, pino } from 'pino';
import { pathForLog } from './auth/token-in-url.ts';

/**
 * The log: JSON lines. What is written of a request or an error is an allow-list, so that no header,
 * query or body (a token, a note) can get into it.
 */
export function makeLog(level: string, destination?: DestinationStream): Logger {
  const options = {
    level,
    base: { service: 'sweep-ledger' },
    timestamp: pino.stdTimeFunctions.isoTime,
    serializers: { err: errorFields, req: () => undefined, res: () => undefined },
  };
  return destination === undefined ? pino(options) : pino(options, destination);
}

/** Writes one line for each answer. */
export function logAnswers(app: FastifyInstance): void {
  app.addHook('onResponse', async (request, reply) => {
    request.log.info(
      {
        method: request.method,
        route: request.routeOptions.url,
        path: pathForLog(request.url),
        status: reply.statusCode,
        ms: Math.round(reply.elapsedTime * 10) / 10,
        club: request.actor?.clubId,
      },
      'answered',
    );
  });
}

function errorFields(error: unknown): unknown {
  if (!(error instanceof Error)) return { message: String(error) };
  const { name, message, stack, cause } = error;
  return { name, message, stack, ...(cause === undefined ? {} : { cause: errorFields(cause) }) };
}
