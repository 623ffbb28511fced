import { promisify } from 'node:util';
import { gunzip } from 'node:zlib';
import { type Entry, fromBufferPromise, type ZipFile } from 'yauzl';
import type { ReadError } from '../../core/formats/read-types.ts';
import { fail, ok, type Result } from '../../core/result.ts';

/** What came out of a packed file, and the name that it had inside. */
export interface UnpackedFile {
  readonly bytes: Uint8Array;
  readonly fileName: string | null;
}

const unzipping = promisify(gunzip);

/** Text that was measured packs to a twentieth; what unpacks to more than this is made to harm. */
const mostRatio = 200;
/** Below it a ratio says nothing. */
const leastCap = 64 * 1024;

/** Whether bytes are gzip (RFC 1952) by their first three: magic number and the one method. */
export function isGzip(bytes: Uint8Array): boolean {
  return bytes[0] === 0x1f && bytes[1] === 0x8b && bytes[2] === 8;
}

/** Whether bytes are a ZIP archive, by the mark of its first entry or of its empty end. */
export function isZip(bytes: Uint8Array): boolean {
  const [p, k, kind] = bytes;
  return p === 0x50 && k === 0x4b && (kind === 3 || kind === 5);
}

/** How many bytes may come out of so many. */
function capFor(packed: number, mostBytes: number): number {
  return Math.min(mostBytes, Math.max(leastCap, mostRatio * packed));
}

/** Unpacks gzip. Errors: `packed_damaged`, `too_many_bytes`. */
export async function ungzip(
  packed: Uint8Array,
  mostBytes: number,
): Promise<Result<Uint8Array, ReadError>> {
  const cap = capFor(packed.length, mostBytes);
  try {
    return ok(await unzipping(packed, { maxOutputLength: cap }));
  } catch (error) {
    return fail(codeOf(error) === 'ERR_BUFFER_TOO_LARGE' ? tooMuch(cap) : damaged('gzip'));
  }
}

/**
 * The one file in a ZIP archive; its path inside is dropped. Errors: `packed_damaged`,
 * `packed_encrypted`, `packed_not_one_file`, `too_many_bytes`.
 */
export async function unzipOne(
  packed: Uint8Array,
  mostBytes: number,
): Promise<Result<UnpackedFile, ReadError>> {
  try {
    const zip = await fromBufferPromise(Buffer.from(packed), { lazyEntries: true });
    const files = await filesIn(zip);
    const [entry] = files;
    if (entry === undefined || files.length > 1) return fail(notOneFile);
    if (entry.isEncrypted()) return fail(encrypted);
    const cap = capFor(packed.length, mostBytes);
    if (entry.uncompressedSize > cap) return fail(tooMuch(cap));
    const bytes = await read(zip, entry, cap);
    const fileName = entry.fileName.split('/').at(-1) ?? null;
    return bytes === null ? fail(tooMuch(cap)) : ok({ bytes, fileName });
  } catch {
    return fail(damaged('ZIP'));
  }
}

/** At most two: more need not be known. Folders and what systems hide beside a file do not count. */
async function filesIn(zip: ZipFile): Promise<Entry[]> {
  const files: Entry[] = [];
  for await (const entry of zip.eachEntry()) {
    const parts = entry.fileName.split('/');
    if (parts.at(-1) === '' || parts.some((part) => /^(\.|__)/.test(part))) continue;
    files.push(entry);
    if (files.length > 1) break;
  }
  return files;
}

/** Counts what really comes out: an archive may state another size. */
async function read(zip: ZipFile, entry: Entry, cap: number): Promise<Uint8Array | null> {
  const chunks: Buffer[] = [];
  let length = 0;
  for await (const chunk of await zip.openReadStreamPromise(entry)) {
    length += chunk.length;
    if (length > cap) return null;
    chunks.push(chunk);
  }
  return Buffer.concat(chunks, length);
}

function codeOf(error: unknown): unknown {
  return error instanceof Error && 'code' in error ? error.code : undefined;
}

function tooMuch(cap: number): ReadError {
  return {
    code: 'too_many_bytes',
    detail: `Unpacked, the file has more than the ${cap} bytes that are taken.`,
    remedy: 'Send a smaller file, or the file itself without packing.',
  };
}

function damaged(kind: 'gzip' | 'ZIP'): ReadError {
  return {
    code: 'packed_damaged',
    detail: `The ${kind} body cannot be unpacked.`,
    remedy: 'Pack the file anew, or send it without packing.',
  };
}

const encrypted: ReadError = {
  code: 'packed_encrypted',
  detail: 'The file in the archive is encrypted.',
  remedy: 'Send it without a password.',
};

const notOneFile: ReadError = {
  code: 'packed_not_one_file',
  detail: 'An archive must hold exactly one file.',
  remedy: 'Send each sweep in a request of its own.',
};
