/** One kind of problem: what its page says and which status it answers with. */
export interface ProblemKind {
  readonly status: number;
  readonly title: string;
  /** What it means, for the page behind `type`. */
  readonly meaning: string;
  /** What to do about it. */
  readonly remedy: string;
}

/** Every problem the service answers with, by slug. The pages and the documents come from here. */
export const problemKinds = {
  'invalid-request': {
    status: 400,
    title: 'The request does not match its description',
    meaning:
      'A field, parameter or header is missing, unknown, or not of the kind that the operation takes. Each entry of `errors` names one place.',
    remedy:
      'Correct the places named in `errors`. Unknown fields are refused, so look for spelling.',
  },
  'malformed-request': {
    status: 400,
    title: 'The request cannot be read',
    meaning: 'The URL, a header, the JSON or the multipart body is broken.',
    remedy: 'Send a well-formed request; `detail` says what could not be read.',
  },
  'invalid-cursor': {
    status: 400,
    title: 'The cursor does not belong to this list',
    meaning: 'A cursor continues one list under one set of filters; this one was made for another.',
    remedy: 'Start the list again without `cursor`, or follow the `next` link unchanged.',
  },
  'digest-mismatch': {
    status: 400,
    title: 'The body does not have the digest that was sent',
    meaning: 'The SHA-256 of the bytes that arrived differs from `Content-Digest`.',
    remedy: 'Send the file again; nothing was kept.',
  },
  'digest-unsupported': {
    status: 400,
    title: 'The digest cannot be checked',
    meaning: '`Content-Digest` has no SHA-256 in the form of RFC 9530.',
    remedy: 'Send `Content-Digest: sha-256=:<base64>:`, or leave the header out.',
  },
  'token-in-url': {
    status: 400,
    title: 'A token must not stand in the URL',
    meaning: 'URLs are kept in logs and histories, so a token in one counts as seen by others.',
    remedy: 'Send it as `Authorization: Bearer <token>`, and replace the token that was exposed.',
  },
  unauthenticated: {
    status: 401,
    title: 'A valid token is needed',
    meaning: 'The request has no bearer token, or one that is not known here.',
    remedy: 'Send `Authorization: Bearer <token>` with a token of the club.',
  },
  'insufficient-right': {
    status: 403,
    title: 'The token may not do this',
    meaning:
      'The token is valid, but its role or its scopes do not have the right that this needs.',
    remedy: 'Use a token with the right that `detail` names, or ask a steward of the club.',
  },
  'not-found': {
    status: 404,
    title: 'There is no such thing here',
    meaning: 'The path leads nowhere, or the club has no record of that id or key.',
    remedy: 'Check the path and the id or key; the lists show what there is.',
  },
  'method-not-allowed': {
    status: 405,
    title: 'The method is not for this path',
    meaning: 'The path exists but does not take this method.',
    remedy: 'Use one of the methods in the `Allow` header.',
  },
  'not-acceptable': {
    status: 406,
    title: 'No form of the answer matches Accept',
    meaning: 'The resource exists, but in none of the media types that `Accept` asks for.',
    remedy: 'Ask for one of the media types that `detail` lists, or leave `Accept` out.',
  },
  'request-timeout': {
    status: 408,
    title: 'The request did not arrive in time',
    meaning: 'The connection was open but the request was not completed.',
    remedy: 'Send the request again.',
  },
  'key-in-use': {
    status: 409,
    title: 'The key is in use',
    meaning: 'Another record of the club and of this kind has the key.',
    remedy: 'Choose another key, or edit the record that has it.',
  },
  'last-steward': {
    status: 409,
    title: 'The club needs a steward',
    meaning: 'This is the one member left who can administer people and the club.',
    remedy: 'Make another member a steward first.',
  },
  'member-erased': {
    status: 409,
    title: 'The member has been erased',
    meaning: 'Nothing is left to change: an erased member is an id and a pseudonym for good.',
    remedy: 'Add a new member if the person comes back.',
  },
  'file-of-other-antenna': {
    status: 409,
    title: 'These bytes are the record of another antenna',
    meaning:
      'The club holds exactly this file already, for another antenna; one measurement belongs to one antenna.',
    remedy:
      'Look at the record in `existing`. If the file is right, the antenna in the path is not.',
  },
  'plane-unavailable': {
    status: 409,
    title: 'The sweep cannot be given at that plane',
    meaning:
      'A sweep holds where it was taken. To move it through the feed line the line must be known, which this record does not allow.',
    remedy: "Leave `plane` out to get the answer at the sweep's own plane.",
  },
  'phase-unknown': {
    status: 409,
    title: 'The sweep lacks the phase that this needs',
    meaning:
      'The answer needs the complex reflection, but the sign of the reactance or the whole phase was not measured; it would have to be invented.',
    remedy: 'Ask for points as JSON or CSV, and for SWR against the reference of the file.',
  },
  stale: {
    status: 412,
    title: 'The record has changed since it was read',
    meaning: '`If-Match` names a revision that is not the present one.',
    remedy:
      'Read the record again and repeat the edit with its new `ETag`. A weak tag (`W/`) never matches: switch off compression in a proxy that weakens tags.',
  },
  'too-large': {
    status: 413,
    title: 'The body is too large',
    meaning: 'The body, or the number of points in the file, exceeds the limit of this service.',
    remedy: 'Send a smaller file, or ask the operator about the limit.',
  },
  'uri-too-long': {
    status: 414,
    title: 'The URL is too long',
    meaning: 'The path or a part of it exceeds the limit.',
    remedy: 'Shorten the URL.',
  },
  'unsupported-media-type': {
    status: 415,
    title: 'The body is of a media type that the operation does not take',
    meaning: 'The `Content-Type` is not one that the operation documents.',
    remedy: 'Send `Content-Type: application/json`.',
  },
  'unknown-file-kind': {
    status: 415,
    title: 'The file is of no kind that is read here',
    meaning:
      'The content is neither Touchstone, nor delimited text, nor a JSON sweep. The name of a file is not looked at.',
    remedy: 'Export the sweep as Touchstone or as delimited text and send that.',
  },
  'unreadable-file': {
    status: 422,
    title: 'The file could not be read as a sweep',
    meaning:
      'The kind of file was recognised, but something in it is broken or would have to be guessed. Nothing was kept.',
    remedy: '`errors` has the line and column; `remedy` says what to do.',
  },
  'columns-to-confirm': {
    status: 422,
    title: 'Please confirm what the columns mean',
    meaning:
      'The file is delimited text, and what its columns hold is not certain. Nothing was kept.',
    remedy:
      'Look at `proposal`, correct its `columns` where needed, and send the file again with it as the `columns` parameter.',
  },
  'unknown-reference': {
    status: 422,
    title: 'The request names a record that does not exist',
    meaning: 'A site, analyzer, plan or band named in the request is not known to the club.',
    remedy: 'Create it first, or correct the name; `errors` has the place.',
  },
  'implausible-fact': {
    status: 422,
    title: 'A fact cannot be so',
    meaning: 'The value has the right form but contradicts itself or the calendar.',
    remedy: 'Correct the value named in `errors`.',
  },
  'implausible-cable': {
    status: 422,
    title: 'No cable has these figures',
    meaning:
      'The impedance, the velocity factor or the losses are outside of what cables have, or the losses do not follow the law of cables. Nothing was kept.',
    remedy:
      'Check the units (hertz, dB per 100 m, ohms) and the place named in `errors`; `code` says which rule is broken.',
  },
  'line-check-impossible': {
    status: 422,
    title: 'The sweep cannot serve as a check of this line',
    meaning:
      'It is too narrow or too coarse for the length, has no phase or no even steps, or shows no end. Nothing was kept.',
    remedy: '`detail` says what sweep would serve; `code` says which rule is broken.',
  },
  'precondition-required': {
    status: 428,
    title: 'The edit must name the revision it is based on',
    meaning: 'Without `If-Match` an edit could overwrite what somebody else has just changed.',
    remedy: 'Read the record and send its `ETag` as `If-Match`.',
  },
  'too-many-requests': {
    status: 429,
    title: 'Too many requests',
    meaning:
      'More requests came from this address, or with this token, than are taken in a minute.',
    remedy: 'Wait for the seconds that `Retry-After` gives, and send fewer.',
  },
  'headers-too-large': {
    status: 431,
    title: 'The header is too large',
    meaning: 'The header fields together exceed the limit.',
    remedy: 'Send fewer or shorter header fields.',
  },
  internal: {
    status: 500,
    title: 'Something went wrong here',
    meaning: 'A fault of the service. The log has it under the id in `instance`.',
    remedy: 'Try again; if it stays, give the operator the id in `instance`.',
  },
  'record-corrupt': {
    status: 500,
    title: 'The stored record is damaged',
    meaning: 'What was read from storage does not match its checksum, so it is not given out.',
    remedy: 'Tell the operator, who can restore a backup.',
  },
  unavailable: {
    status: 503,
    title: 'The service cannot answer at the moment',
    meaning: 'It is starting, stopping, or its storage does not answer.',
    remedy: 'Try again after the seconds in `Retry-After`. An upload is safe to repeat.',
  },
  'storage-full': {
    status: 507,
    title: 'The storage is full',
    meaning: 'The disk has no room. Nothing was kept; reading still works.',
    remedy: 'Tell the operator; repeat the upload when there is room.',
  },
} as const satisfies Record<string, ProblemKind>;

export type ProblemSlug = keyof typeof problemKinds;

/** One place where a request is at fault. */
export interface ProblemPlace {
  readonly detail: string;
  /** JSON pointer into the body, as a URI fragment (`#/feed_line/0/cable`). */
  readonly pointer?: string;
  /** Name of a query or path parameter. */
  readonly parameter?: string;
  readonly header?: string;
  /** One-based line and column of an uploaded file. */
  readonly line?: number;
  readonly column?: number;
}

export interface ProblemParts {
  readonly detail?: string;
  readonly errors?: readonly ProblemPlace[];
  readonly headers?: Readonly<Record<string, string>>;
  /** Members beside the standard ones; names of letters, digits and `_`. */
  readonly members?: Readonly<Record<string, unknown>>;
}

/** Thrown by a handler to answer with a problem of the catalogue. */
export class Problem extends Error {
  override readonly name = 'Problem';
  readonly slug: ProblemSlug;
  readonly parts: ProblemParts;

  constructor(slug: ProblemSlug, parts: ProblemParts = {}) {
    super(parts.detail ?? problemKinds[slug].title);
    this.slug = slug;
    this.parts = parts;
  }
}

const maxPlaces = 100;

/** The body of a problem (RFC 9457) as an object, `type` absolute under the public URL. */
export function problemBody(
  slug: ProblemSlug,
  parts: ProblemParts,
  publicUrl: string,
  requestId: string,
): Record<string, unknown> {
  const kind = problemKinds[slug];
  const places = parts.errors ?? [];
  return {
    type: `${publicUrl}/problems/${slug}`,
    title: kind.title,
    status: kind.status,
    detail: parts.detail ?? kind.meaning,
    instance: `urn:uuid:${requestId}`,
    ...(places.length > 0 ? { errors: places.slice(0, maxPlaces) } : {}),
    ...(places.length > maxPlaces ? { errors_truncated: true } : {}),
    ...parts.members,
  };
}
