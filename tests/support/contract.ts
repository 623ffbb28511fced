import { readFileSync } from 'node:fs';
import { Ajv2020 } from 'ajv/dist/2020.js';
import addFormats from 'ajv-formats';
import type { LightMyRequestResponse } from 'fastify';
import type { OpenAPIV3_1 } from 'openapi-types';

const documentUrl = new URL('../../openapi/openapi.json', import.meta.url);
const document: OpenAPIV3_1.Document = JSON.parse(readFileSync(documentUrl, 'utf8'));
const ajv = new Ajv2020({ strict: false, allErrors: true });
addFormats.default(ajv);
ajv.addSchema(document, 'openapi');

/**
 * Holds an answer against the document: its operation, status, media type and body must be there.
 * A path that the document does not know must be a 404 or 405, or one of the pages of /docs.
 */
export function assertDocumented(
  method: string,
  url: string,
  answer: LightMyRequestResponse,
): void {
  const path = url.split('?', 1)[0];
  const paths = document.paths ?? {};
  // A path without parameters goes before one with, as in the standard.
  const template =
    paths[path] === undefined
      ? Object.keys(paths).find((candidate) => matches(candidate, path))
      : path;
  const operation = template === undefined ? undefined : operationOf(template, method);
  if (template === undefined || operation === undefined) {
    if (answer.statusCode === 404 || answer.statusCode === 405) return;
    if (/^\/(docs|openapi\.json)/.test(path)) return;
    throw new Error(
      `${method} ${path} is not in the document, yet it answers ${answer.statusCode}.`,
    );
  }
  if (answer.statusCode === 304 || answer.statusCode === 204) return;
  const place = ['paths', template, method.toLowerCase(), 'responses', String(answer.statusCode)];
  const documented = operation.responses?.[answer.statusCode];
  if (documented === undefined) throw new Error(`${place.join(' ')} is not in the document.`);
  if (method !== 'HEAD') assertBody(place, documented, answer);
}

function operationOf(template: string, method: string): OpenAPIV3_1.OperationObject | undefined {
  const item = document.paths?.[template];
  if (method === 'GET' || method === 'HEAD') return item?.get;
  if (method === 'POST') return item?.post;
  if (method === 'DELETE') return item?.delete;
  return method === 'PATCH' ? item?.patch : undefined;
}

function assertBody(
  place: readonly string[],
  documented: OpenAPIV3_1.ResponseObject | OpenAPIV3_1.ReferenceObject,
  answer: LightMyRequestResponse,
): void {
  const type = String(answer.headers['content-type']).split(';', 1)[0];
  const media = 'content' in documented ? documented.content?.[type] : undefined;
  if (media === undefined) throw new Error(`${place.join(' ')} does not know ${type}.`);
  if (!/json$/.test(type)) return;
  const pointer = [...place, 'content', type, 'schema'].map(pointerToken).join('/');
  const valid = ajv.validate({ $ref: `openapi#/${pointer}` }, answer.json());
  if (!valid) throw new Error(`${place.join(' ')}: ${ajv.errorsText()}\n${answer.body}`);
}

function matches(template: string, path: string): boolean {
  const wanted = template.split('/');
  const given = path.split('/');
  return (
    wanted.length === given.length &&
    wanted.every((part, i) => part.startsWith('{') || part === given[i])
  );
}

function pointerToken(name: string): string {
  return encodeURIComponent(name.replaceAll('~', '~0').replaceAll('/', '~1'));
}
