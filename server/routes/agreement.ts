import { principalOf } from '../auth/bearer.ts';
import { clubAgreement, mostAgreementSweeps } from '../history/agreement-report.ts';
import type { App } from '../http/app-type.ts';
import type { Service } from '../service.ts';
import { agreementsSchema, agreementsToWire } from '../wire/agreement.ts';
import { noQuery } from '../wire/common.ts';
import { answers, commonProblems, jsonAnswer } from '../wire/problem.ts';

/** How well a club's instruments agree. */
export function agreementRoutes(app: App, service: Service): void {
  app.get(
    '/v1/analyzers/agreement',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getAgreement',
        tags: ['analyzers'],
        summary: 'How well the instruments agree: repeatability, reproducibility, biases',
        description: `From antennas that two or more analyzers measured within a day, in one era and in the same weather; the newest ${mostAgreementSweeps} sweeps of each. Empty where no two ever met.`,
        querystring: noQuery,
        response: answers({ 200: jsonAnswer('By measure.', agreementsSchema) }, commonProblems),
      },
    },
    async (request) => agreementsToWire(await clubAgreement(service, principalOf(request).clubId)),
  );
}
