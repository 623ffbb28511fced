import { promisify } from 'node:util';
import {
  brotliCompress,
  brotliDecompress,
  brotliDecompressSync,
  constants,
  crc32,
  deflateRaw,
  inflate,
  inflateRaw,
  inflateRawSync,
} from 'node:zlib';
import { StoreError } from '../port.ts';
// What answers have in common. Kept texts need it for ever: never edit it, add another beside it.
import textDictionary from './text-dictionary-1.json' with { type: 'json' };

/** `deflate` is raw DEFLATE, or Brotli behind a byte with which no DEFLATE stream can begin. */
export type Codec = 'none' | 'deflate';

/** As the first byte of a DEFLATE stream it would announce a block of the reserved type. */
const brotliMark = 0x06;
/** Zlib's format begins with another byte. */
const textMark = 0x01;
const checksumBytes = 4;
/** Beyond it files shrink by less than a hundredth more, at many times the work. */
const brotliQuality = 5;

export interface Packed {
  readonly codec: Codec;
  readonly body: Uint8Array;
}

/** No derived answer comes near it. */
const mostTextBytes = 256 * 1024 * 1024;

const dictionary = Buffer.from(textDictionary.text);
const compressing = promisify(brotliCompress);
const decompressing = promisify(brotliDecompress);
const inflating = promisify(inflateRaw);
const deflating = promisify(deflateRaw);
const inflatingText = promisify(inflate);

/** Compresses in the thread pool, away from the event loop; keeps what would not shrink as it is. */
export async function pack(bytes: Uint8Array): Promise<Packed> {
  const params = {
    [constants.BROTLI_PARAM_MODE]: constants.BROTLI_MODE_TEXT,
    [constants.BROTLI_PARAM_QUALITY]: brotliQuality,
    [constants.BROTLI_PARAM_SIZE_HINT]: bytes.length,
  };
  const body = Buffer.concat([Buffer.of(brotliMark), await compressing(bytes, { params })]);
  return body.length < bytes.length ? { codec: 'deflate', body } : { codec: 'none', body: bytes };
}

/** Undoes `pack`; `mostBytes` bounds the result. Throws `corrupt`. */
export async function unpack({ codec, body }: Packed, mostBytes: number): Promise<Uint8Array> {
  if (codec === 'none') return body;
  const bound = { maxOutputLength: Math.max(1, mostBytes) };
  try {
    if (body[0] === brotliMark) return await decompressing(body.subarray(1), bound);
    return await inflating(body, bound);
  } catch (error) {
    throw notDecompressing(error);
  }
}

/** The same in the thread that asks, for threads that do nothing else meanwhile. Throws `corrupt`. */
export function unpackHere({ codec, body }: Packed, mostBytes: number): Uint8Array {
  if (codec === 'none') return body;
  const bound = { maxOutputLength: Math.max(1, mostBytes) };
  try {
    if (body[0] === brotliMark) return brotliDecompressSync(body.subarray(1), bound);
    return inflateRawSync(body, bound);
  } catch (error) {
    throw notDecompressing(error);
  }
}

/**
 * A text as raw DEFLATE with the dictionary, between a mark and its CRC-32: nothing else guards it,
 * and the checksum of zlib's own format was seen to pass a flipped bit in a text as short as these.
 */
export async function packText(text: string): Promise<Uint8Array> {
  const bytes = Buffer.from(text);
  const checksum = Buffer.alloc(checksumBytes);
  checksum.writeUInt32LE(crc32(bytes));
  return Buffer.concat([Buffer.of(textMark), await deflating(bytes, { dictionary }), checksum]);
}

/** Undoes `packText`, also of a text that was packed as zlib's format has it. Throws `corrupt`. */
export async function unpackText(body: Uint8Array): Promise<string> {
  try {
    return (await unpackedText(body)).toString('utf8');
  } catch (error) {
    throw notDecompressing(error);
  }
}

async function unpackedText(body: Uint8Array): Promise<Buffer> {
  const maxOutputLength = mostTextBytes;
  if (body[0] !== textMark) return inflatingText(body, { maxOutputLength });
  const end = body.length - checksumBytes;
  const bytes = await inflating(body.subarray(1, end), { maxOutputLength, dictionary });
  const checksum = Buffer.from(body.subarray(end)).readUInt32LE();
  if (checksum !== crc32(bytes)) throw new Error('Its checksum is another.');
  return bytes;
}

function notDecompressing(error: unknown): StoreError {
  return new StoreError('corrupt', 'A stored body does not decompress.', undefined, error);
}
