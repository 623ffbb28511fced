import { z } from 'zod';
import { actorOf } from '../auth/bearer.ts';
import type { App } from '../http/app-type.ts';
import { checkContentDigest, sha256 } from '../http/digests.ts';
import { refuseFuture } from '../http/measured-at.ts';
import { pageRequest, sendPage } from '../http/pages.ts';
import { readProblem } from '../http/read-problems.ts';
import { bodyBytes, uploadedFile } from '../http/upload-body.ts';
import { ingestLoadCheck } from '../ingest.ts';
import { residualReportOf } from '../residual-report.ts';
import type { Service } from '../service.ts';
import { toSnakeCase } from '../wire/case.ts';
import { idOrKeySchema, pageQuery, pageSchema } from '../wire/common.ts';
import {
  loadCheckSchema,
  loadCheckToWire,
  loadQuerySchema,
  residualReportSchema,
} from '../wire/load-check.ts';
import { answers, jsonAnswer } from '../wire/problem.ts';
import { rounded } from '../wire/rounding.ts';
import { fileQuery, fileRequestBody, uploadHeaders, uploadProblems } from '../wire/upload.ts';
import { findOrRefuse, listProblems } from './editables.ts';

const tags = ['analyzers'];
const params = z.strictObject({ analyzer: idOrKeySchema });
const listQuery = z.strictObject(pageQuery);
const uploadQuery = z.strictObject({ ...fileQuery, load: loadQuerySchema });

const listSchema = z.object({
  ...pageSchema(loadCheckSchema).shape,
  residual: residualReportSchema,
});

/** The sweeps of known loads by an analyzer, newest first, and what they tell of its error. */
export function loadCheckRoutes(app: App, service: Service): void {
  app.get(
    '/v1/analyzers/:analyzer/load-checks',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'listLoadChecks',
        tags,
        summary: 'List sweeps of known loads, with the residual error that follows from them',
        params,
        querystring: listQuery,
        response: answers({ 200: jsonAnswer('A page of checks.', listSchema) }, [
          ...listProblems,
          'not-found',
        ]),
      },
    },
    async (request, reply) => {
      const analyzer = await findOrRefuse(request, service, 'analyzers', request.params.analyzer);
      const asked = pageRequest(request, request.query);
      const page = await service.store.listLoadChecks(analyzer.clubId, analyzer.id, asked);
      const list = sendPage(request, reply, service, request.query, page, loadCheckToWire);
      const residual = await residualReportOf(service, analyzer);
      return { ...list, residual: rounded(toSnakeCase(residual)) };
    },
  );
}

/** The upload of a sweep of a known load; stands among the routes that take any body. */
export function loadCheckUploadRoutes(app: App, service: Service): void {
  app.post(
    '/v1/analyzers/:analyzer/load-checks',
    {
      config: { right: 'measure' },
      bodyLimit: service.limits.maxBytes,
      schema: {
        operationId: 'uploadLoadCheck',
        tags,
        summary: 'Upload a sweep of a known load',
        description:
          "Tells the analyzer's own residual error. The same bytes again are answered with the first record.",
        params,
        querystring: uploadQuery,
        headers: uploadHeaders,
        'x-request-body': fileRequestBody,
        response: answers(
          {
            200: jsonAnswer('These bytes are kept already: the first record.', loadCheckSchema),
            201: jsonAnswer('The record that was made.', loadCheckSchema),
          },
          uploadProblems,
        ),
      },
    },
    async (request, reply) => {
      const { query } = request;
      const analyzer = await findOrRefuse(request, service, 'analyzers', request.params.analyzer);
      const { measured_at: measuredAt = null, load } = query;
      refuseFuture(measuredAt, service.now());
      checkContentDigest(request.headers['content-digest'], bodyBytes(request));
      const { bytes, fileName } = await uploadedFile(request, service.limits.maxBytes);
      const { clubId, memberId, at } = actorOf(request, service);
      const incoming = {
        id: service.newId(),
        clubId,
        receivedAt: at,
        uploadedBy: memberId,
        bytes,
        fileSha256: sha256(bytes).toString('hex'),
        fileName: query.file_name ?? fileName,
        columns: query.columns ?? null,
        port: query.port ?? null,
        limits: service.limits,
      };
      const made = ingestLoadCheck(incoming, {
        analyzerId: analyzer.id,
        loadOhm: load === 'open' ? null : load === 'short' ? 0 : load,
        measuredAt,
        note: query.note,
        invented: false,
      });
      if (!made.ok) throw readProblem(made.error);
      const { outcome, record } = await service.store.addLoadCheck(made.value);
      return reply.code(outcome === 'added' ? 201 : 200).send(loadCheckToWire(record));
    },
  );
}
