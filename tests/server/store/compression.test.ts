import { deflateRawSync, deflateSync } from 'node:zlib';
import { describe, expect, it } from 'vitest';
import { pack, packText, unpack, unpackText } from '../../../server/store/sqlite/compression.ts';
import { resonatorFile } from '../../support/club-records.ts';

const file = Buffer.from(resonatorFile());

describe('a file that is kept', () => {
  it('comes back byte for byte and takes less room', async () => {
    const packed = await pack(file);
    expect(packed.body.length).toBeLessThan(0.6 * file.length);
    expect(Buffer.from(await unpack(packed, file.length)).equals(file)).toBe(true);
  });

  it('is kept as it is where nothing is gained', async () => {
    expect(await pack(Buffer.of(1, 2, 3))).toMatchObject({ codec: 'none' });
  });

  it('is read in the form of the first releases', async () => {
    const old = { codec: 'deflate', body: deflateRawSync(file) } as const;
    expect(Buffer.from(await unpack(old, file.length)).equals(file)).toBe(true);
  });

  it('never grows beyond what was sent', async () => {
    const packed = await pack(file);
    await expect(unpack(packed, file.length - 1)).rejects.toMatchObject({ kind: 'corrupt' });
  });
});

describe('a derived text that is kept', () => {
  const text = JSON.stringify({ plane: 'measured', resonances: [], note: 'ä € 𝄞' });

  it('comes back as it was', async () => {
    expect(await unpackText(await packText(text))).toBe(text);
  });

  it('is read in the form of the first releases', async () => {
    expect(await unpackText(deflateSync(text))).toBe(text);
  });
});
