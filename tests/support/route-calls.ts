import { readFileSync } from 'node:fs';
import type { InjectOptions } from 'fastify';
import type { OpenAPIV3_1 } from 'openapi-types';

/** One operation of the document, as a request that its validation lets through. */
export interface RouteCall {
  readonly operationId: string;
  readonly method: 'GET' | 'POST' | 'PATCH' | 'DELETE';
  /** With the names of path parameters in braces, and the query parameters that it cannot lack. */
  readonly template: string;
  /** The names of its path parameters. */
  readonly parameters: readonly string[];
  /** The names of its query parameters. */
  readonly queries: readonly string[];
  readonly right: string;
  /** Its answer goes on and on, so that it is asked only where it is refused. */
  readonly isEndless: boolean;
  readonly body: Pick<InjectOptions, 'payload' | 'headers'>;
}

const document: OpenAPIV3_1.Document = JSON.parse(
  readFileSync(new URL('../../openapi/openapi.json', import.meta.url), 'utf8'),
);

/** Bodies that the document has no example of, since their answers differ each time. */
const bodiesWithoutExample: Readonly<Record<string, object>> = {
  addToken: { label: 'matrix' },
  withdrawWork: { reason: 'told twice' },
  addWebhook: { url: 'https://receiver.example/ledger' },
  editWebhook: { active: false },
};

/** Every operation of the document. */
export function routeCalls(): RouteCall[] {
  return Object.entries(document.paths ?? {}).flatMap(([path, item]) =>
    (['get', 'post', 'patch', 'delete'] as const).flatMap((method) => {
      const operation = item?.[method];
      return operation === undefined ? [] : [routeCall(path, method, operation)];
    }),
  );
}

function routeCall(
  path: string,
  method: 'get' | 'post' | 'patch' | 'delete',
  operation: OpenAPIV3_1.OperationObject,
): RouteCall {
  const { operationId = '', security = [], responses = {} } = operation;
  const parameters = (operation.parameters ?? []) as readonly OpenAPIV3_1.ParameterObject[];
  const needed = parameters.filter((one) => one.in === 'query' && one.required === true);
  const query = needed.map((one) => `${one.name}=${encodeURIComponent(exampleOf(one))}`);
  return {
    operationId,
    method: method.toUpperCase() as RouteCall['method'],
    template: query.length === 0 ? path : `${path}?${query.join('&')}`,
    parameters: parameters.flatMap((one) => (one.in === 'path' ? one.name : [])),
    queries: parameters.flatMap((one) => (one.in === 'query' ? one.name : [])),
    right: security[0]?.['bearerAuth']?.[0] ?? 'public',
    isEndless: JSON.stringify(responses['200'] ?? {}).includes('text/event-stream'),
    body: bodyOf(operation),
  };
}

function exampleOf({ example, schema }: OpenAPIV3_1.ParameterObject): string {
  const { examples, enum: choices } = (schema ?? {}) as OpenAPIV3_1.SchemaObject;
  return String(example ?? examples?.[0] ?? choices?.[0] ?? 'x');
}

function bodyOf({ operationId = '', requestBody }: OpenAPIV3_1.OperationObject): RouteCall['body'] {
  // Harmless where it is not looked at.
  const ifMatch = { 'if-match': '*' };
  if (requestBody === undefined || !('content' in requestBody)) return { headers: ifMatch };
  const [type, media] = Object.entries(requestBody.content)[0];
  const payload = media.example ?? bodiesWithoutExample[operationId];
  if (payload === undefined) throw new Error(`${operationId} has no example of its body.`);
  return { payload, headers: { ...ifMatch, 'content-type': type } };
}
