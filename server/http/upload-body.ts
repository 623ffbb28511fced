import type { FastifyRequest } from 'fastify';
import type { ReadError } from '../../core/formats/read-types.ts';
import type { Result } from '../../core/result.ts';
import { Problem } from '../problems.ts';
import { isGzip, isZip, ungzip, unzipOne } from './packed-file.ts';
import { readProblem } from './read-problems.ts';

/** The file of an upload: its bytes, and the name that came with it in a form. */
export interface UploadedFile {
  readonly bytes: Uint8Array;
  readonly fileName: string | null;
}

/**
 * The file in a request whose body was kept as bytes: the body itself, or the one part `file` of a
 * form; unpacked where it is gzip or a ZIP archive of one file. The body has been counted against the
 * limit as a whole, so a form cannot go round it, and what is unpacked is counted again.
 */
export async function uploadedFile(
  request: FastifyRequest,
  mostBytes: number,
): Promise<UploadedFile> {
  const body = await decodedBody(request, mostBytes);
  const type = request.headers['content-type'] ?? '';
  const sent = /^multipart\/form-data\s*;/i.test(type)
    ? await filePart(body, type)
    : { bytes: body, fileName: null };
  if (isGzip(sent.bytes)) {
    const bytes = readOrRefuse(await ungzip(sent.bytes, mostBytes));
    return { bytes, fileName: sent.fileName?.replace(/\.gz$/i, '') ?? null };
  }
  if (isZip(sent.bytes)) return readOrRefuse(await unzipOne(sent.bytes, mostBytes));
  return sent;
}

/** The body without its Content-Encoding (RFC 9110, section 8.4). */
async function decodedBody(
  request: FastifyRequest,
  mostBytes: number,
): Promise<Uint8Array<ArrayBuffer>> {
  const encoding = request.headers['content-encoding']?.trim().toLowerCase() ?? 'identity';
  const body = bodyBytes(request);
  if (encoding === 'identity') return body;
  if (encoding === 'gzip' || encoding === 'x-gzip') {
    return new Uint8Array(readOrRefuse(await ungzip(body, mostBytes)));
  }
  throw new Problem('unsupported-media-type', {
    detail: 'Send the file itself, or with `Content-Encoding: gzip`.',
    headers: { 'accept-encoding': 'gzip, identity' },
  });
}

function readOrRefuse<Value>(result: Result<Value, ReadError>): Value {
  if (!result.ok) throw readProblem(result.error);
  return result.value;
}

/** The body as it arrived; empty if there was none. */
export function bodyBytes(request: FastifyRequest): Uint8Array<ArrayBuffer> {
  return request.body instanceof Uint8Array ? new Uint8Array(request.body) : new Uint8Array();
}

async function filePart(body: Uint8Array<ArrayBuffer>, type: string): Promise<UploadedFile> {
  const parts = [...(await parseForm(body, type)).entries()];
  const [name, file] = parts[0] ?? [];
  if (parts.length !== 1 || name !== 'file' || !(file instanceof File)) {
    throw new Problem('invalid-request', {
      errors: [
        {
          detail: 'The form must have one part: a file named `file`. Facts go into the query.',
          pointer: '#',
        },
      ],
    });
  }
  return { bytes: new Uint8Array(await file.arrayBuffer()), fileName: file.name || null };
}

/** A form from a body that was kept as bytes. Throws `malformed-request`. */
export async function parseForm(body: Uint8Array<ArrayBuffer>, type: string): Promise<FormData> {
  try {
    return await new Response(body, { headers: { 'content-type': type } }).formData();
  } catch {
    throw new Problem('malformed-request', { detail: 'The multipart body cannot be read.' });
  }
}
