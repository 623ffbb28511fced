import type { FastifyReply, FastifyRequest } from 'fastify';
import { actorOf, principalOf } from '../auth/bearer.ts';
import { isNotModified } from '../http/conditional.ts';
import { requireMatch, revisionTag } from '../http/etags.ts';
import { Problem, type ProblemSlug } from '../problems.ts';
import type { Service } from '../service.ts';
import type { Editable, EditableKind, EditableKinds } from '../store/port.ts';
import { commonProblems } from '../wire/problem.ts';

/** What sites, antennas and analyzers share: how they are found, added and edited. */

export const listProblems: readonly ProblemSlug[] = [...commonProblems, 'invalid-cursor'];
export const findProblems: readonly ProblemSlug[] = [...commonProblems, 'not-found'];
export const addProblems: readonly ProblemSlug[] = [
  ...commonProblems,
  'key-in-use',
  'too-large',
  'unsupported-media-type',
  'storage-full',
];
export const editProblems: readonly ProblemSlug[] = [
  ...addProblems,
  'not-found',
  'stale',
  'precondition-required',
];

/** The record that a path names. Throws `not-found`. */
export async function findOrRefuse<K extends EditableKind>(
  request: FastifyRequest,
  service: Service,
  kind: K,
  idOrKey: string,
): Promise<Editable<EditableKinds[K]>> {
  const { clubId } = principalOf(request);
  const found = await service.store.findEditable(kind, clubId, idOrKey);
  if (found === null) {
    throw new Problem('not-found', { detail: `None of the club's ${kind} is \`${idOrKey}\`.` });
  }
  return found;
}

/** The record that a body or query names by id or key. Throws `unknown-reference`. */
export async function resolveReference<K extends EditableKind>(
  request: FastifyRequest,
  service: Service,
  kind: K,
  idOrKey: string,
  place: { readonly pointer: string } | { readonly parameter: string },
): Promise<Editable<EditableKinds[K]>> {
  const { clubId } = principalOf(request);
  const found = await service.store.findEditable(kind, clubId, idOrKey);
  if (found === null) {
    throw new Problem('unknown-reference', {
      errors: [{ detail: `None of the club's ${kind} is \`${idOrKey}\`.`, ...place }],
    });
  }
  return found;
}

/** Answers with one record, or with 304 where the client has it. */
export function sendEditable<Facts, Wire>(
  request: FastifyRequest,
  reply: FastifyReply,
  record: Editable<Facts>,
  toWire: (record: Editable<Facts>) => Wire,
): FastifyReply {
  if (isNotModified(request, reply, revisionTag(record))) return reply.code(304).send();
  return reply.send(toWire(record));
}

/** Adds a record and answers 201 with its place. */
export async function addEditable<K extends EditableKind, Wire>(
  request: FastifyRequest,
  reply: FastifyReply,
  service: Service,
  kind: K,
  fresh: { readonly key: string; readonly facts: EditableKinds[K] },
  toWire: (record: Editable<EditableKinds[K]>) => Wire,
): Promise<FastifyReply> {
  const actor = actorOf(request, service);
  const record = await service.store.addEditable(kind, actor, { id: service.newId(), ...fresh });
  return reply
    .code(201)
    .header('location', `${service.publicUrl}/v1/${kind}/${record.id}`)
    .header('etag', revisionTag(record))
    .send(toWire(record));
}

/** Edits a record if `If-Match` names its present revision. */
export async function editEditable<K extends EditableKind, Wire>(
  request: FastifyRequest,
  reply: FastifyReply,
  service: Service,
  kind: K,
  present: Editable<EditableKinds[K]>,
  next: { readonly key: string; readonly facts: EditableKinds[K] },
  toWire: (record: Editable<EditableKinds[K]>) => Wire,
): Promise<FastifyReply> {
  requireMatch(request.headers['if-match'], revisionTag(present));
  const actor = actorOf(request, service);
  const { store } = service;
  const record = await store.editEditable(kind, actor, present.id, present.revision, next);
  return reply.header('etag', revisionTag(record)).send(toWire(record));
}
