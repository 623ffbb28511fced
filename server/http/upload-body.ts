import type { FastifyRequest } from 'fastify';
import { Problem } from '../problems.ts';

/** The file of an upload: its bytes, and the name that came with it in a form. */
export interface UploadedFile {
  readonly bytes: Uint8Array;
  readonly fileName: string | null;
}

/**
 * The file in a request whose body was kept as bytes: the body itself, or the one part `file` of a
 * form. The body has been counted against the limit as a whole, so a form cannot go round it.
 */
export async function uploadedFile(request: FastifyRequest): Promise<UploadedFile> {
  const encoding = request.headers['content-encoding'];
  if (encoding !== undefined && encoding !== 'identity') {
    throw new Problem('unsupported-media-type', {
      detail: 'Send the file itself, without Content-Encoding.',
      headers: { 'accept-encoding': 'identity' },
    });
  }
  const body = bodyBytes(request);
  const type = request.headers['content-type'] ?? '';
  if (!/^multipart\/form-data\s*;/i.test(type)) return { bytes: body, fileName: null };
  return filePart(body, type);
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
