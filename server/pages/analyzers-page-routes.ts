import type { App } from '../http/app-type.ts';
import type { AnalyzerWire } from '../routes/analyzers.ts';
import { analyzersPage } from './analyzers-page.ts';
import { hidden } from './hidden.ts';
import { MemberApi } from './member-api.ts';
import { texts } from './texts.ts';
import { sendPage } from './viewer.ts';

/** The instruments of the club. */
export function analyzersPageRoutes(scope: App): void {
  scope.get('/analyzers', hidden, async (request, reply) => {
    const api = new MemberApi(scope, request);
    const { items } = await api.read<{ items: readonly AnalyzerWire[] }>('/v1/analyzers?limit=500');
    const body = analyzersPage(items);
    return sendPage(api, reply, { title: texts.analyzers.title, path: '/analyzers', body });
  });
}
