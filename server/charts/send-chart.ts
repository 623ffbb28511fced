import type { FastifyReply, FastifyRequest } from 'fastify';
import { negotiate } from '../http/accept.ts';
import { derivedTag } from '../http/etags.ts';
import type { KeptAnswers } from '../http/kept-answers.ts';
import { pngOf } from './png.ts';

/** A chart that follows from records alone. */
export interface TaggedChart {
  /** All that it follows from. */
  readonly basis: readonly (string | number | null)[];
  readonly svg: () => Promise<string>;
}

/** Where the figures of a chart are as a table, and of what kind. */
export interface ChartTable {
  readonly url: string;
  readonly type: string;
}

/** Raised when charts of the same basis come to look different. */
const drawingVersion = 'chart-1';

/** Sends a chart as SVG or PNG, or 304 where the client has it. */
export async function sendChart(
  request: FastifyRequest,
  reply: FastifyReply,
  kept: KeptAnswers,
  table: ChartTable,
  find: () => Promise<TaggedChart>,
): Promise<FastifyReply> {
  const type = negotiate(request.headers.accept, ['image/svg+xml', 'image/png']);
  reply.header('vary', 'Accept');
  reply.header('link', `<${table.url}>; rel="alternate"; type="${table.type}"`);
  return kept.send(
    request,
    reply,
    async () => {
      const { basis, svg } = await find();
      return {
        tag: derivedTag([drawingVersion, type, table.url, ...basis]),
        text: async () => (type === 'image/png' ? pngOf(await svg()) : svg()),
      };
    },
    type,
  );
}
