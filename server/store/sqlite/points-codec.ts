import { crc32, deflateRawSync, inflateRawSync } from 'node:zlib';
import { type StoredPoints, StoreError } from '../port.ts';

/**
 * Points as bytes, exact to the last bit and small: a column whose values are decimals of few
 * places (as they are in files) is kept as whole numbers of the last place, each as the difference
 * from the one before; any other column as it is. Little-endian throughout.
 *
 * Layout: a byte of the columns present (bit 0 real and imaginary part, bit 1 magnitude), the count
 * of points, the columns, each with a byte of its places (255: eight bytes a value), and the CRC-32
 * of all that, without which a flipped bit would be one more measured value. Where that makes it
 * smaller, all of it stands deflated (RFC 1951) behind a byte that no such layout begins with.
 */
const checksumBytes = 4;
const asDoubles = 255;
const mostPlaces = 15;
const deflatedMark = 128;
/** Far more than the points of the longest sweep take. */
const mostBytes = 64 * 1024 * 1024;
/** Twice the difference of two whole numbers below this is exact. */
const largestWhole = 2 ** 50;

/** Packs the points of a sweep. */
export function packPoints(points: StoredPoints): Uint8Array {
  const { frequencyHz, reflectionRe, reflectionIm, reflectionMagnitude } = points;
  const columns = [frequencyHz, reflectionRe, reflectionIm, reflectionMagnitude];
  const present = columns.filter((column) => column !== null);
  const writer = new ByteWriter(2 + present.length * (2 + frequencyHz.length * 10));
  writer.byte((reflectionRe === null ? 0 : 1) | (reflectionMagnitude === null ? 0 : 2));
  writer.whole(frequencyHz.length);
  for (const column of present) packColumn(writer, column);
  const plain = writer.sealed();
  const deflated = deflateRawSync(plain);
  if (deflated.length + 1 >= plain.length) return plain;
  return Buffer.concat([Buffer.of(deflatedMark), deflated]);
}

/** Unpacks what `packPoints` made. Throws `corrupt`. */
export function unpackPoints(bytes: Uint8Array): StoredPoints {
  const reader = new ByteReader(checked(plainOf(bytes)));
  const present = reader.byte();
  const count = reader.whole();
  const frequencyHz = unpackColumn(reader, count);
  const isComplex = (present & 1) !== 0;
  const reflectionRe = isComplex ? unpackColumn(reader, count) : null;
  const reflectionIm = isComplex ? unpackColumn(reader, count) : null;
  const reflectionMagnitude = (present & 2) !== 0 ? unpackColumn(reader, count) : null;
  return { frequencyHz, reflectionRe, reflectionIm, reflectionMagnitude };
}

function plainOf(bytes: Uint8Array): Uint8Array {
  if (bytes[0] !== deflatedMark) return bytes;
  try {
    return inflateRawSync(bytes.subarray(1), { maxOutputLength: mostBytes });
  } catch (error) {
    throw notWhatWasKept(error);
  }
}

function checked(bytes: Uint8Array): Uint8Array {
  const end = bytes.length - checksumBytes;
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const body = bytes.subarray(0, Math.max(0, end));
  if (end >= 0 && view.getUint32(end, true) === crc32(body)) return body;
  throw notWhatWasKept();
}

function notWhatWasKept(cause?: unknown): StoreError {
  return new StoreError('corrupt', 'The stored points are not what was kept.', undefined, cause);
}

function packColumn(writer: ByteWriter, column: Float64Array): void {
  const places = placesOf(column);
  if (places === null) {
    writer.byte(asDoubles);
    for (const value of column) writer.double(value);
    return;
  }
  writer.byte(places);
  const scale = 10 ** places;
  let before = 0;
  for (const value of column) {
    const whole = Math.round(value * scale);
    const difference = whole - before;
    writer.whole(difference < 0 ? -2 * difference - 1 : 2 * difference);
    before = whole;
  }
}

function unpackColumn(reader: ByteReader, count: number): Float64Array {
  const places = reader.byte();
  const column = new Float64Array(count);
  if (places === asDoubles) {
    for (let i = 0; i < count; i++) column[i] = reader.double();
    return column;
  }
  const scale = 10 ** places;
  let whole = 0;
  for (let i = 0; i < count; i++) {
    const folded = reader.whole();
    whole += folded % 2 === 0 ? folded / 2 : -(folded + 1) / 2;
    column[i] = whole / scale;
  }
  return column;
}

/** The fewest places at which every value comes back bit for bit; null if there are none. */
function placesOf(column: Float64Array): number | null {
  let places = 0;
  let i = 0;
  while (i < column.length && places <= mostPlaces) {
    const scale = 10 ** places;
    const whole = Math.round(column[i] * scale);
    // A negative zero is no whole number: only eight bytes keep its sign.
    const isWhole = Math.abs(whole) < largestWhole && !Object.is(whole, -0);
    const isExact = isWhole && Object.is(whole / scale, column[i]);
    if (isExact) i += 1;
    else {
      places += 1;
      i = 0;
    }
  }
  return places <= mostPlaces ? places : null;
}

class ByteWriter {
  private readonly buffer: Uint8Array;
  private readonly view: DataView;
  private at = 0;

  constructor(mostBytes: number) {
    this.buffer = new Uint8Array(mostBytes + 16);
    this.view = new DataView(this.buffer.buffer);
  }

  byte(value: number): void {
    this.buffer[this.at++] = value;
  }

  /** Seven bits a byte, the low ones first. */
  whole(value: number): void {
    let rest = value;
    while (rest >= 128) {
      this.buffer[this.at++] = (rest % 128) + 128;
      rest = Math.floor(rest / 128);
    }
    this.buffer[this.at++] = rest;
  }

  double(value: number): void {
    this.view.setFloat64(this.at, value, true);
    this.at += 8;
  }

  /** What was written, with its checksum. */
  sealed(): Uint8Array {
    this.view.setUint32(this.at, crc32(this.buffer.subarray(0, this.at)), true);
    this.at += checksumBytes;
    return this.buffer.slice(0, this.at);
  }
}

class ByteReader {
  private readonly buffer: Uint8Array;
  private readonly view: DataView;
  private at = 0;

  constructor(buffer: Uint8Array) {
    this.buffer = buffer;
    this.view = new DataView(buffer.buffer, buffer.byteOffset, buffer.byteLength);
  }

  byte(): number {
    return this.buffer[this.at++];
  }

  whole(): number {
    let value = 0;
    let weight = 1;
    let byte = this.byte();
    while (byte >= 128) {
      value += (byte - 128) * weight;
      weight *= 128;
      byte = this.byte();
    }
    return value + byte * weight;
  }

  double(): number {
    this.at += 8;
    return this.view.getFloat64(this.at - 8, true);
  }
}
