import { promisify } from 'node:util';
import { constants, deflate, deflateRaw, inflate, inflateRaw } from 'node:zlib';
import { StoreError } from '../port.ts';

export type Codec = 'none' | 'deflate';

export interface Packed {
  readonly codec: Codec;
  readonly body: Uint8Array;
}

/** No derived answer comes near it. */
const mostTextBytes = 256 * 1024 * 1024;

const deflating = promisify(deflateRaw);
const inflating = promisify(inflateRaw);
const deflatingText = promisify(deflate);
const inflatingText = promisify(inflate);

/** Compresses in the thread pool, away from the event loop; keeps what would not shrink as it is. */
export async function pack(bytes: Uint8Array): Promise<Packed> {
  const body = await deflating(bytes, { level: constants.Z_DEFAULT_COMPRESSION, memLevel: 9 });
  return body.length < bytes.length ? { codec: 'deflate', body } : { codec: 'none', body: bytes };
}

/** Undoes `pack`; `mostBytes` bounds the result. Throws `corrupt`. */
export async function unpack({ codec, body }: Packed, mostBytes: number): Promise<Uint8Array> {
  if (codec === 'none') return body;
  try {
    return await inflating(body, { maxOutputLength: Math.max(1, mostBytes) });
  } catch (error) {
    throw notDecompressing(error);
  }
}

/** A text deflated, with a checksum: nothing else guards it. */
export function packText(text: string): Promise<Uint8Array> {
  return deflatingText(text);
}

/** Undoes `packText`. Throws `corrupt`. */
export async function unpackText(body: Uint8Array): Promise<string> {
  try {
    return (await inflatingText(body, { maxOutputLength: mostTextBytes })).toString('utf8');
  } catch (error) {
    throw notDecompressing(error);
  }
}

function notDecompressing(error: unknown): StoreError {
  return new StoreError('corrupt', 'A stored body does not decompress.', undefined, error);
}
