import { crc32, deflateRawSync } from 'node:zlib';

export interface ZipMember {
  readonly name: string;
  readonly bytes: Uint8Array;
  /** What the archive says of the size; the truth if left out. */
  readonly statedBytes?: number;
  readonly encrypted?: boolean;
}

/** A ZIP archive (APPNOTE, PKWARE: local headers, central directory, its end), with lies if asked. */
export function zipOf(members: readonly ZipMember[]): Buffer {
  const locals: Buffer[] = [];
  const central: Buffer[] = [];
  let offset = 0;
  for (const { name, bytes, statedBytes = bytes.length, encrypted = false } of members) {
    const packed = deflateRawSync(bytes);
    const path = Buffer.from(name);
    const common = Buffer.alloc(26);
    common.writeUInt16LE(20, 0);
    common.writeUInt16LE((encrypted ? 1 : 0) | 0x800, 2);
    common.writeUInt16LE(8, 4);
    common.writeUInt32LE(crc32(bytes), 10);
    common.writeUInt32LE(packed.length, 14);
    common.writeUInt32LE(statedBytes, 18);
    common.writeUInt16LE(path.length, 22);
    const local = Buffer.concat([Buffer.from('PK\x03\x04', 'latin1'), common, path, packed]);
    const place = Buffer.alloc(14);
    place.writeUInt32LE(offset, 10);
    const versionMadeBy = Buffer.of(20, 0);
    central.push(
      Buffer.concat([Buffer.from('PK\x01\x02', 'latin1'), versionMadeBy, common, place, path]),
    );
    locals.push(local);
    offset += local.length;
  }
  const directory = Buffer.concat(central);
  const end = Buffer.alloc(22);
  end.write('PK\x05\x06', 'latin1');
  end.writeUInt16LE(members.length, 8);
  end.writeUInt16LE(members.length, 10);
  end.writeUInt32LE(directory.length, 12);
  end.writeUInt32LE(offset, 16);
  return Buffer.concat([...locals, directory, end]);
}
