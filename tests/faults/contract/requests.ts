import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import fc from 'fast-check';
import type { InjectOptions } from 'fastify';
import { findCable } from '../../../core/line/cables.ts';
import { resolveFeedLine } from '../../../core/line/feed-line.ts';
import { resonatorFile } from '../../support/club-records.ts';
import { lineEndFile } from '../../support/through-line.ts';
import { hostileText, type Schema, type Surroundings, valueFor } from './schema-values.ts';

interface Parameter {
  readonly name: string;
  readonly in: 'path' | 'query' | 'header';
  readonly required: boolean;
  readonly schema: Schema;
}

export interface Operation {
  readonly method: 'GET' | 'POST' | 'PATCH' | 'DELETE';
  readonly template: string;
  readonly parameters: readonly Parameter[];
  /** By media type. */
  readonly bodies: Readonly<Record<string, Schema>>;
}

export type FuzzRequest = InjectOptions & {
  readonly url: string;
  readonly headers: Readonly<Record<string, string>>;
};

interface ListedOperation {
  readonly parameters?: readonly Parameter[];
  readonly requestBody?: { readonly content: Readonly<Record<string, { schema: Schema }>> };
}

const documentUrl = new URL('../../../openapi/openapi.json', import.meta.url);
const document: {
  readonly paths: Readonly<Record<string, Readonly<Record<string, ListedOperation>>>>;
  readonly components: { readonly schemas: Readonly<Record<string, Schema>> };
} = JSON.parse(readFileSync(documentUrl, 'utf8'));

export const { schemas } = document.components;

/** What cannot be asked in this way, with the reason. */
export const leftOut: Readonly<Record<string, string>> = {
  'GET /v1/events': 'its answer does not end',
};

/** Every operation of the document but what is left out. */
export const operations: readonly Operation[] = Object.entries(document.paths)
  .flatMap(([template, item]) =>
    Object.entries(item).map(([method, { parameters = [], requestBody }]) => ({
      method: method.toUpperCase() as Operation['method'],
      template,
      parameters,
      bodies: Object.fromEntries(
        Object.entries(requestBody?.content ?? {}).map(([type, { schema }]) => [type, schema]),
      ),
    })),
  )
  .filter(({ method, template }) => !(`${method} ${template}` in leftOut));

/** Stands for the tag that the record has when the request is sent. */
export const currentTag = '"the tag of now"';

/** Requests for an operation; about half of them keep to the document in all parts. */
export function requestTo(
  operation: Operation,
  known: Surroundings['known'],
): fc.Arbitrary<FuzzRequest> {
  return fc.oneof(
    requestWith(operation, { schemas, known, hostilePercent: 0 }),
    requestWith(operation, { schemas, known, hostilePercent: 12 }),
  );
}

function requestWith(operation: Operation, around: Surroundings): fc.Arbitrary<FuzzRequest> {
  return fc
    .record({
      path: partsOf(operation, 'path', around),
      query: partsOf(operation, 'query', around),
      header: partsOf(operation, 'header', around).map(sendableHeaders),
      body: bodyOf(operation, around),
      authorization: authorizationOf(around),
    })
    .map(({ path, query, header, body, authorization }) => ({
      method: operation.method,
      url: urlOf(operation.template, path, query),
      headers: { ...body.headers, ...header, ...authorization },
      ...(body.payload === undefined ? {} : { payload: body.payload }),
    }));
}

function partsOf(operation: Operation, place: Parameter['in'], around: Surroundings) {
  const parts = operation.parameters.filter((parameter) => parameter.in === place);
  const model = Object.fromEntries(
    parts.map(({ name, schema }) => [name, parameterOf(name, schema, around)]),
  );
  const isKept = place === 'path' || around.hostilePercent === 0;
  const requiredKeys = parts.filter(({ required }) => required && isKept).map(({ name }) => name);
  return fc.record(model, { requiredKeys });
}

function parameterOf(name: string, schema: Schema, around: Surroundings): fc.Arbitrary<unknown> {
  const value = valueFor(schema, around, name);
  if (name !== 'if-match') return value;
  return fc.oneof(
    { weight: 3, arbitrary: fc.constantFrom(currentTag, '*') },
    { weight: 1, arbitrary: value },
  );
}

function urlOf(
  template: string,
  path: Readonly<Record<string, unknown>>,
  query: Readonly<Record<string, unknown>>,
): string {
  const filled = template.replaceAll(/\{(\w+)\}/g, (_, name) =>
    encodeURIComponent(textOf(path[name])),
  );
  // A list is sent as the name said again and again.
  const asked = Object.entries(query).flatMap(([name, value]) =>
    (Array.isArray(value) ? value : [value]).map(
      (one) => `${encodeURIComponent(name)}=${encodeURIComponent(textOf(one))}`,
    ),
  );
  return asked.length === 0 ? filled : `${filled}?${asked.join('&')}`;
}

function textOf(value: unknown): string {
  return typeof value === 'string' ? value : String(JSON.stringify(value));
}

/** No connection carries other characters in a header than these (RFC 9110, 5.5). */
function sendableHeaders(headers: Readonly<Record<string, unknown>>): Record<string, string> {
  const texts = Object.entries(headers).map(([name, value]) => [
    name,
    textOf(value).replaceAll(/[^\t\x20-\x7e\x80-\xff]/g, '?'),
  ]);
  return Object.fromEntries(texts);
}

function authorizationOf({ hostilePercent }: Surroundings) {
  const own = fc.constant<Record<string, string>>({});
  if (hostilePercent === 0) return own;
  const other = hostileText.map((text) => sendableHeaders({ authorization: `Bearer ${text}` }));
  return fc.oneof({ weight: 20, arbitrary: own }, { weight: 1, arbitrary: other });
}

interface Body {
  readonly headers: Record<string, string>;
  readonly payload?: string | Buffer;
}

function bodyOf(operation: Operation, around: Surroundings): fc.Arbitrary<Body> {
  const bodies = Object.entries(operation.bodies).map(([type, schema]) =>
    bodyOfType(type, schema, around),
  );
  const none = fc.constant<Body>({ headers: {} });
  if (bodies.length === 0) return none;
  const documented = fc.oneof(...bodies);
  if (around.hostilePercent === 0) return documented;
  const other: fc.Arbitrary<Body> = fc
    .tuple(
      fc.constantFrom('application/json', 'text/plain', 'x', 'multipart/form-data'),
      hostileText,
    )
    .map(([type, payload]) => ({ headers: { 'content-type': type }, payload }));
  return fc.oneof(
    { weight: 16, arbitrary: documented },
    { weight: 1, arbitrary: none },
    { weight: 3, arbitrary: other },
  );
}

function bodyOfType(type: string, schema: Schema, around: Surroundings): fc.Arbitrary<Body> {
  if (type === 'application/json') {
    return valueFor(schema, around).map((value) => ({
      headers: { 'content-type': type },
      payload: JSON.stringify(value),
    }));
  }
  const isHostile = around.hostilePercent > 0;
  if (type === 'application/octet-stream') {
    return fileOf(isHostile).map((payload) => ({ headers: { 'content-type': type }, payload }));
  }
  return fc
    .tuple(fileOf(isHostile), fc.constantFrom('file', ...(isHostile ? ['', 'other'] : [])))
    .map(([file, field]) => ({
      headers: { 'content-type': 'multipart/form-data; boundary=edge' },
      payload: Buffer.concat([
        Buffer.from(
          `--edge\r\ncontent-disposition: form-data; name="${field}"; filename="a.s1p"\r\n\r\n`,
        ),
        file,
        Buffer.from('\r\n--edge--\r\n'),
      ]),
    }));
}

/** A file of 22 m of a cable with an open end. */
export const lineFile = (() => {
  const section = { cable: 'm17-74-rg213', lengthM: 22, lengthU95M: 0.05 };
  const line = resolveFeedLine([{ ...section, extraLossDb: 0, choke: false }], findCable);
  if (!line.ok) throw new Error(line.error.detail);
  return lineEndFile(line.value);
})();

/** Files of measurements, with a part cut out and another put in if they are to be hostile. */
function fileOf(isHostile: boolean): fc.Arbitrary<Buffer> {
  const antennas = fc
    .record({
      resonanceHz: fc.integer({ min: 13_000_000, max: 15_000_000 }),
      resistanceOhm: fc.double({ min: 1, max: 500, noNaN: true }),
      points: fc.integer({ min: 2, max: 60 }),
    })
    .map((facts) => Buffer.from(resonatorFile(facts)));
  const good = fc.oneof(antennas, fc.constant(Buffer.from(lineFile)));
  if (!isHostile) return good;
  const cut = fc
    .tuple(good, fc.nat(4000), fc.nat(200), fc.oneof(hostileText, fc.constant('1e400 nan inf')))
    .map(([file, from, length, text]) => {
      const start = from % (file.length + 1);
      return Buffer.concat([
        file.subarray(0, start),
        Buffer.from(text),
        file.subarray(start + length),
      ]);
    });
  const bytes = fc.uint8Array({ maxLength: 400 }).map((array) => Buffer.from(array));
  const json = fc.jsonValue().map((value) => Buffer.from(JSON.stringify(value)));
  return fc.oneof(
    good,
    cut,
    cut.map((file) => gzipSync(file)),
    bytes,
    json,
  );
}
