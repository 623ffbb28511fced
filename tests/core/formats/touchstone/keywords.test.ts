import { describe, expect, it } from 'vitest';
import { pointsOf, refused, taken } from './reading.ts';

interface Parts {
  readonly ports?: string;
  readonly header?: string;
  readonly rows?: string;
  readonly rest?: string;
}

function file({
  ports = '[Number of Ports] 1\n',
  header = '[Number of Frequencies] 1\n',
  rows = '14 .1 .2\n',
  rest = '[End]\n',
}: Parts): string {
  return `[Version] 2.0\n# MHz S RI\n${ports}${header}[Network Data]\n${rows}${rest}`;
}

describe('a keyword', () => {
  it('is read whatever its case, with blanks before it and within', () => {
    const text = file({ ports: '  [NUMBER  of ports ]  1 ! one\n' });
    expect(taken(text).codes).toEqual([]);
  });

  it('must be closed', () => {
    expect(refused(file({ header: '[Number of Frequencies 1\n' }))).toMatchObject({
      code: 'keyword_open',
      line: 4,
    });
  });

  it.each([
    '[Number of Ports] 1\n',
    '[Version] 2.0\n',
    '[Matrix Format] Full\n[Matrix Format] Lower\n',
    '[Reference] 50\n[Reference] 75\n',
    '[Two-Port Data Order] 12_21\n[Two-Port Order] 21_12\n',
  ])('may not stand twice: %j', (header) => {
    expect(refused(file({ header })).code).toBe('keyword_twice');
  });

  it.each<[string, Parts]>([
    ['a header behind the data', { rest: '[Reference] 75\n[End]\n' }],
    ['a header behind the end', { rest: '[End]\n[Number of Frequencies] 2\n', header: '' }],
    ['noise before the network', { header: '[Noise Data]\n' }],
    ['an end before the network', { header: '[End]\n' }],
    ['the end of no information', { header: '[End Information]\n' }],
    ['information behind the data', { rest: '[Begin Information]\n[End]\n' }],
  ])('may not be misplaced: %s', (_, parts) => {
    expect(refused(file(parts)).code).toBe('keyword_misplaced');
  });

  it.each([
    ['[Number of Frequencies] many\n', 'count_bad'],
    ['[Number of Frequencies] 0\n', 'count_bad'],
    ['[Number of Noise Frequencies] 1.5\n', 'count_bad'],
    ['[Matrix Format] Diagonal\n', 'matrix_format_unknown'],
    ['[Two-Port Data Order] 11_22\n', 'order_unknown'],
    ['[Two-Port Order] 11_22\n', 'order_unknown'],
  ])('may not say nonsense: %j', (header, code) => {
    expect(refused(file({ header }))).toMatchObject({ code, line: 4 });
  });

  it.each(['0', '-1', '1.5', 'one', ''])('may not count `%s` ports', (count) => {
    const ports = `[Number of Ports] ${count}\n`;
    expect(refused(file({ ports }))).toMatchObject({ code: 'ports_bad', line: 3 });
  });

  it('that is unknown is told once, however many there are', () => {
    const header = '[Colour] blue\n[Smell] none\n';
    expect(taken(file({ header })).codes).toEqual(['keyword_unknown', 'frequencies_missing']);
  });
});

describe('the number of ports', () => {
  it('must be said', () => {
    expect(refused(file({ ports: '' })).code).toBe('ports_missing');
  });

  it('must be said before the references', () => {
    expect(refused(file({ ports: '', header: '[Reference] 50\n' }))).toMatchObject({
      code: 'ports_missing',
      line: 3,
    });
  });
});

describe('an information block', () => {
  it('is opaque, whatever it holds', () => {
    const header =
      '[Begin Information]\n[Network Data]\n# GHz\n[unclosed\n1 2 3\n! c\n[END  information]\n[Number of Frequencies] 1\n';
    expect(taken(file({ header })).codes).toEqual([]);
  });

  it('that does not end swallows the data, so that there are none', () => {
    expect(refused(file({ header: '[Begin Information]\n' })).code).toBe('no_points');
  });
});

describe('noise', () => {
  const parts: Parts = {
    ports: '[Number of Ports] 2\n[Two-Port Data Order] 21_12\n',
    header: '[Number of Frequencies] 1\n[Number of Noise Frequencies] 2\n',
    rows: '14 .1 .2 .5 0 .5 0 .3 .4\n',
    rest: '[Noise Data]\n1 .7 .64 69 19\n2 .7 .64 69 19\n[End]\n',
  };

  it('is passed over, and told once', () => {
    const { sweep, codes } = taken(file(parts), { port: 1 });
    expect(pointsOf(sweep)).toEqual([[14e6, 0.1, 0.2]]);
    expect(codes).toEqual(['noise_passed_over', 'other_port_matched']);
  });
});

describe('references', () => {
  it('of several ports stand in their keyword, not in the option line', () => {
    const text = file({}).replace('# MHz S RI', '# MHz S RI R 50 75');
    expect(refused(text).code).toBe('references_differ');
    const ports = '[Number of Ports] 2\n[Two-Port Data Order] 21_12\n';
    const rows = '14 .1 .2 .5 0 .5 0 .3 .4\n';
    const two = file({ ports, rows }).replace('# MHz S RI', '# MHz S RI R 50 75');
    expect(refused(two).code).toBe('references_differ');
  });
});

describe('a file of many points', () => {
  it('is read whole, in either version', () => {
    const rows = Array.from({ length: 3000 }, (_, i) => `${i + 1} .1 .2 ! ${'x'.repeat(i % 50)}\n`);
    const two = file({ header: '[Number of Frequencies] 3000\n', rows: rows.join('') });
    const one = `# MHz S RI R 50\n${rows.join('')}`;
    const short = `# MHz S RI R 50\n${rows.map((row) => row.slice(0, -3).replace(/ !.*/, '')).join('\n')}`;
    for (const text of [one, two, short]) {
      const { sweep } = taken(text);
      expect(sweep.frequencyHz).toHaveLength(3000);
      expect(sweep.frequencyHz[2999]).toBe(3000e6);
    }
  });

  it('is read whole if its numbers are as short as can be', () => {
    const rows = Array.from({ length: 9 }, (_, i) => `${i + 1} 1 0 0 0 0 0 1 0\n`).join('');
    expect(taken(`# MHz S RI\n${rows}`, { port: 1 }).sweep.frequencyHz).toHaveLength(9);
    const spread = Array.from({ length: 400 }, (_, i) => `${i + 1}\n1\n0\n`).join('');
    const wrapped = file({ header: '[Number of Frequencies] 400\n', rows: spread });
    expect(taken(wrapped).sweep.frequencyHz).toHaveLength(400);
  });
});
