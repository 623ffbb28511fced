import type { OpenAPIV3_1 } from 'openapi-types';
import type { App } from '../http/app-type.ts';

type Operation = OpenAPIV3_1.OperationObject;

/** The OpenAPI document of an app that was built with `document: null`, without examples. */
export function documentOf(app: App): OpenAPIV3_1.Document {
  const document = app.swagger() as OpenAPIV3_1.Document;
  for (const operation of operationsOf(document)) {
    placeRequestBody(operation);
    placeHeaders(operation);
  }
  pruneSchemas(document);
  return document;
}

/** Every operation of a document. */
export function operationsOf(document: OpenAPIV3_1.Document): Operation[] {
  return Object.values(document.paths ?? {}).flatMap((item) =>
    [item?.get, item?.post, item?.patch, item?.delete].flatMap((operation) => operation ?? []),
  );
}

/** A body that no schema validates is described by hand in the route, as `x-request-body`. */
function placeRequestBody(
  operation: Operation & { 'x-request-body'?: OpenAPIV3_1.RequestBodyObject },
) {
  const body = operation['x-request-body'];
  if (body === undefined) return;
  operation.requestBody = body;
  delete operation['x-request-body'];
}

/** What answers of a status carry in their header, in every operation alike. */
const headersByStatus: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  201: { Location: 'Where the record is.' },
  401: { 'WWW-Authenticate': 'The challenge of RFC 6750.' },
  503: { 'Retry-After': 'Seconds.' },
};

function placeHeaders({ responses = {} }: Operation): void {
  const isConditional = '304' in responses;
  for (const [status, response] of Object.entries(responses)) {
    if ('$ref' in response) continue;
    const named = { ...headersByStatus[status] };
    if (isConditional && (status === '200' || status === '304'))
      named['ETag'] = 'Names this state.';
    for (const [name, description] of Object.entries(named)) {
      response.headers = {
        ...response.headers,
        [name]: { description, schema: { type: 'string' } },
      };
    }
  }
}

/** Drops the schemas that nothing refers to: each is made once for input and once for output. */
function pruneSchemas(document: OpenAPIV3_1.Document): void {
  const schemas = document.components?.schemas ?? {};
  const wanted = new Set<string>();
  const queue = [JSON.stringify(document.paths)];
  for (let text = queue.pop(); text !== undefined; text = queue.pop()) {
    for (const [, name] of text.matchAll(/"#\/components\/schemas\/([^"]+)"/g)) {
      if (wanted.has(name) || schemas[name] === undefined) continue;
      wanted.add(name);
      queue.push(JSON.stringify(schemas[name]));
    }
  }
  for (const name of Object.keys(schemas)) if (!wanted.has(name)) delete schemas[name];
}
