import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { defaultReadLimits } from '../../core/formats/read-types.ts';
import { decodeText } from '../../core/formats/text.ts';
import { readTouchstone } from '../../core/formats/touchstone/read-touchstone.ts';
import { makeSweep } from '../../core/sweep.ts';

const limits = { maxPoints: 100_001 };
const words = fc.constantFrom(
  '#',
  '[Version] 2.0',
  '[Version]',
  '[Number of Ports] 1',
  '[Number of Ports] 2',
  '[Reference]',
  '[Network Data]',
  '[Noise Data]',
  '[End]',
  '[Matrix Format] Lower',
  '[Begin Information]',
  '[End Information]',
  'MHz',
  'Hz',
  'S',
  'Z',
  'Y',
  'H',
  'G',
  'RI',
  'MA',
  'DB',
  'R',
  'R 50',
  '50',
  '14',
  '14.5',
  '.1',
  '-1',
  '1e5',
  '1D2',
  '0,5',
  'nan',
  '-inf',
  '!',
  '! Z0 75',
  '\t',
  '\n',
  '\r\n',
  '\r',
  ' ',
  '[',
  ']',
  '12_21',
);

function expectKept(read: ReturnType<typeof readTouchstone>): void {
  if (read.ok) {
    expect(makeSweep(read.value.sweep).ok).toBe(true);
    return;
  }
  expect(read.error.code).toMatch(/^[a-z_]+$/);
  expect(read.error.remedy.length).toBeGreaterThan(5);
}

describe('whatever a file holds', () => {
  it('reading gives a sweep that keeps its promises, or an error with a code and a remedy', () => {
    fc.assert(
      fc.property(fc.array(fc.oneof(words, words, fc.string()), { maxLength: 60 }), (parts) => {
        expectKept(readTouchstone(parts.join(' '), { limits }));
      }),
      { numRuns: 3000 },
    );
  });

  it('a good file with some bytes overwritten does too', () => {
    const good =
      '! a\r\n[Version] 2.0\r\n# MHz S MA R 50\r\n[Number of Ports] 1\r\n[Number of Frequencies] 2\r\n[Network Data]\r\n14 .1 20\r\n15 .2 -30\r\n[End]\r\n';
    const place = fc.nat({ max: good.length - 1 });
    let takenCount = 0;
    let refusedCount = 0;
    fc.assert(
      fc.property(
        fc.array(fc.tuple(place, fc.integer({ min: 0, max: 255 })), { maxLength: 4 }),
        (changes) => {
          const bytes = new TextEncoder().encode(good);
          for (const [at, byte] of changes) bytes[at] = byte;
          const decoded = decodeText(bytes, defaultReadLimits);
          if (!decoded.ok) return;
          const read = readTouchstone(decoded.value.text, { limits });
          if (read.ok) takenCount += 1;
          else refusedCount += 1;
          expectKept(read);
        },
      ),
      { numRuns: 3000, seed: 1 },
    );
    expect(takenCount).toBeGreaterThan(300);
    expect(refusedCount).toBeGreaterThan(300);
  });

  it('bytes of any kind do too', () => {
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 200 }), (bytes) => {
        const decoded = decodeText(bytes, defaultReadLimits);
        if (decoded.ok) expectKept(readTouchstone(decoded.value.text, { limits }));
      }),
      { numRuns: 2000 },
    );
  });

  it('rows of numbers behind an option line are taken or refused by their width', () => {
    let takenCount = 0;
    const row = fc.array(fc.integer({ min: -9, max: 99 }), { minLength: 1, maxLength: 10 });
    const option = fc.constantFrom(
      '# MHz S RI R 50',
      '# GHz Z MA',
      '#',
      '# Hz Y DB R 75',
      '# kHz G RI R 1',
    );
    fc.assert(
      fc.property(option, fc.array(row, { minLength: 1, maxLength: 6 }), (head, rows) => {
        const text = `${head}\n${rows.map((numbers) => numbers.join(' ')).join('\n')}\n`;
        const read = readTouchstone(text, { limits });
        if (read.ok) takenCount += 1;
        else expect(read.error.line).toBeGreaterThan(0);
      }),
      { numRuns: 2000, seed: 1 },
    );
    expect(takenCount).toBeGreaterThan(20);
  });

  it.each([
    ['a million marks', '!'.repeat(1_000_000)],
    ['a million opening brackets', '['.repeat(1_000_000)],
    ['a million blanks', `# ${' '.repeat(1_000_000)}`],
    ['a million words', `# MHz S RI R 50\n${'nan '.repeat(300_000)}\n`],
    ['a million digits', `# MHz S RI R 50\n${'1'.repeat(1_000_000)} 1 1\n`],
    ['a million lines', `# MHz S RI R 50\n${'\n'.repeat(1_000_000)}14 .1 .2`],
    ['a long option line', `# ${'MHz '.repeat(250_000)}`],
    ['a million second option lines', `# MHz S RI R 50\n14 .1 .2\n${'# GHz\n'.repeat(200_000)}`],
    ['a million unknown keywords', `[Version] 2.0\n# Hz S RI\n${'[x]\n'.repeat(250_000)}`],
    [
      'comments full of promise',
      `# MHz S RI R 50\n${'! gamma gamma gamma gamma\n'.repeat(40_000)}`,
    ],
    ['a long resistance', `# R (${'1'.repeat(500_000)}+`],
  ])('%s end in an answer', (_, text) => {
    const read = readTouchstone(text, { limits });
    expect(typeof read.ok).toBe('boolean');
  });
});
