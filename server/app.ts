import helmet from '@fastify/helmet';
import Fastify, { type FastifyBaseLogger, LogController } from 'fastify';
import {
  serializerCompiler,
  validatorCompiler,
  type ZodTypeProvider,
} from 'fastify-type-provider-zod';
import type { OpenAPIV3_1 } from 'openapi-types';
import { guardRoutes } from './auth/bearer.ts';
import { countRequests } from './auth/request-limits.ts';
import { requireRouteRights } from './auth/route-rights.ts';
import { closeSoon } from './closing.ts';
import { serveDocs } from './docs.ts';
import { answerErrorsAsProblems, refuseSocket, sendError } from './errors.ts';
import type { App } from './http/app-type.ts';
import { keepKnownMethods } from './known-methods.ts';
import { logAnswers } from './log.ts';
import { measureRequests } from './metrics.ts';
import { collectRoutes } from './openapi/collect.ts';
import { pageRoutes } from './pages/page-routes.ts';
import { adviceRoutes } from './routes/advice.ts';
import { agreementRoutes } from './routes/agreement.ts';
import { analyzerRoutes } from './routes/analyzers.ts';
import { antennaRoutes } from './routes/antennas.ts';
import { auditRoutes } from './routes/audit.ts';
import { baselineRoutes } from './routes/baselines.ts';
import { cableRoutes } from './routes/cables.ts';
import { clubRoutes } from './routes/club.ts';
import { compareRoutes } from './routes/compare.ts';
import { compareChartRoutes } from './routes/compare-charts.ts';
import { correctionRoutes } from './routes/corrections.ts';
import { dashboardRoutes } from './routes/dashboard.ts';
import { driftRoutes } from './routes/drift.ts';
import { dueRoutes } from './routes/due.ts';
import { eventRoutes } from './routes/events.ts';
import { historyRoutes } from './routes/history.ts';
import { historyChartRoutes } from './routes/history-charts.ts';
import { lineCheckChartRoutes } from './routes/line-check-charts.ts';
import { lineCheckRoutes, lineCheckUploadRoutes } from './routes/line-checks.ts';
import { loadCheckRoutes, loadCheckUploadRoutes } from './routes/load-checks.ts';
import { memberRoutes } from './routes/members.ts';
import { healthRoutes, metricsRoutes } from './routes/operations.ts';
import { planRoutes } from './routes/plans.ts';
import { problemPageRoutes } from './routes/problem-pages.ts';
import { roundRoutes } from './routes/rounds.ts';
import { siteRoutes } from './routes/sites.ts';
import { sweepChartRoutes } from './routes/sweep-charts.ts';
import { sweepPointRoutes } from './routes/sweep-points.ts';
import { sweepReportRoutes } from './routes/sweep-reports.ts';
import { sweepRoutes } from './routes/sweeps.ts';
import { tokenRoutes } from './routes/tokens.ts';
import { trackRoutes } from './routes/tracks.ts';
import { uploadRoutes } from './routes/upload.ts';
import { webhookRoutes } from './routes/webhooks.ts';
import { workRoutes } from './routes/work.ts';
import type { Service } from './service.ts';
import { withOrigin } from './store/origin.ts';

export interface AppParts {
  readonly service: Service;
  readonly log: FastifyBaseLogger;
  /** What /openapi.json and /docs show; `null` collects the routes for making it anew. */
  readonly document: OpenAPIV3_1.Document | null;
}

const jsonBodyLimit = 64 * 1024;
const requestTimeoutMs = 120_000;

/** Builds the HTTP service from its parts; it does not listen yet. */
export async function buildApp({ service, log, document }: AppParts): Promise<App> {
  const { publicUrl, newId, trustedProxies } = service;
  const app: App = Fastify({
    loggerInstance: log,
    logController: new LogController({ disableRequestLogging: true }),
    genReqId: newId,
    bodyLimit: jsonBodyLimit,
    requestTimeout: requestTimeoutMs,
    trustProxy: trustedProxies.length === 0 ? false : [...trustedProxies],
    return503OnClosing: false,
    onProtoPoisoning: 'error',
    onConstructorPoisoning: 'error',
    frameworkErrors: (error, request, reply) => sendError(error, request, reply, publicUrl),
    clientErrorHandler: (error, socket) => refuseSocket(error, socket, publicUrl, newId()),
  }).withTypeProvider<ZodTypeProvider>();

  app.setValidatorCompiler(validatorCompiler);
  app.setSerializerCompiler(serializerCompiler);
  app.addHook('onRequest', async (request, reply) => {
    reply.header('x-request-id', request.id);
  });
  takeJsonOnly(app);
  requireRouteRights(app);
  keepKnownMethods(app);
  logAnswers(app);
  const metricsText = measureRequests(app, service.lastBackupAt);
  await app.register(helmet, securityHeaders);
  // After the hooks above, so that a refusal is logged, counted and has its headers too.
  answerErrorsAsProblems(app, publicUrl);
  closeSoon(app);
  guardRoutes(app, service, await countRequests(app, service.requestLimits));
  // Last before the handlers: what reads a body loses what was set before it.
  app.addHook('preHandler', (request, _reply, done) => withOrigin(request.ip, done));
  if (document === null) await collectRoutes(app);
  else await serveDocs(app, document);

  healthRoutes(app, service);
  problemPageRoutes(app);
  await app.register(async (scope: App) => pageRoutes(scope, service));
  await app.register(async (behindToken: App) => {
    metricsRoutes(behindToken, service, metricsText);
    clubRoutes(behindToken, service);
    memberRoutes(behindToken, service);
    tokenRoutes(behindToken, service);
    auditRoutes(behindToken, service);
    siteRoutes(behindToken, service);
    antennaRoutes(behindToken, service);
    analyzerRoutes(behindToken, service);
    agreementRoutes(behindToken, service);
    loadCheckRoutes(behindToken, service);
    cableRoutes(behindToken, service);
    lineCheckRoutes(behindToken, service);
    lineCheckChartRoutes(behindToken, service);
    sweepRoutes(behindToken, service);
    correctionRoutes(behindToken, service);
    sweepPointRoutes(behindToken, service);
    sweepReportRoutes(behindToken, service);
    sweepChartRoutes(behindToken, service);
    adviceRoutes(behindToken, service);
    workRoutes(behindToken, service);
    roundRoutes(behindToken, service);
    historyRoutes(behindToken, service);
    driftRoutes(behindToken, service);
    trackRoutes(behindToken, service);
    dashboardRoutes(behindToken, service);
    baselineRoutes(behindToken, service);
    dueRoutes(behindToken, service);
    historyChartRoutes(behindToken, service);
    eventRoutes(behindToken, service);
    webhookRoutes(behindToken, service);
    compareRoutes(behindToken, service);
    compareChartRoutes(behindToken, service);
    planRoutes(behindToken);
    // In a scope of their own, since they take any body.
    await behindToken.register(async (scope: App) => {
      uploadRoutes(scope, service);
      loadCheckUploadRoutes(scope, service);
      lineCheckUploadRoutes(scope, service);
    });
  });
  return app;
}

/** Leaves JSON as the only kind of body; poisoned prototypes are refused. */
function takeJsonOnly(app: App): void {
  app.removeAllContentTypeParsers();
  app.addContentTypeParser(
    'application/json',
    { parseAs: 'string' },
    app.getDefaultJsonParser('error', 'error'),
  );
}

/** Nothing that is answered may be framed, sniffed or run; the docs page has rules of its own. */
const securityHeaders = {
  contentSecurityPolicy: {
    useDefaults: false,
    directives: { defaultSrc: ["'none'"], baseUri: ["'none'"], frameAncestors: ["'none'"] },
  },
  crossOriginResourcePolicy: { policy: 'same-origin' as const },
  referrerPolicy: { policy: 'no-referrer' as const },
  // Whether there is TLS is for the proxy in front to say.
  strictTransportSecurity: false,
};
