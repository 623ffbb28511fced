import { describe, expect, it } from 'vitest';
import { assumedIn, complexOf, readText, refusalOf, scalarOf } from '../../../support/reading.ts';

const columns = 'frequency:MHz,resistance,reactance';
const swrColumns = 'frequency:MHz,swr,reference=50';

/** The same three points, whatever the writing. */
function expectThePoints(text: string, options: { columns?: string } = { columns }): void {
  const { sweep } = readText(text, options);
  expect([...sweep.frequencyHz]).toEqual([8_200_000, 16_100_000, 32_300_000]);
  const { reflectionRe, reflectionIm } = complexOf(readText(text, options));
  // (Z - 50)/(Z + 50) of 50, 50 + j50 and 25 ohm.
  expect([...reflectionRe].map((value) => value + 0)).toEqual(
    [0, 0.2, -1 / 3].map((v) => expect.closeTo(v, 12)),
  );
  expect([...reflectionIm]).toEqual([0, 0.4, 0].map((v) => expect.closeTo(v, 12)));
}

describe('delimited text', () => {
  it.each([
    ['commas', '8.2,50,0\n16.1,50,50.0\n32.3,25,0\n'],
    ['commas and blanks', '8.2, 50 , 0\n16.1, 50, 50.0\n32.3, 25, 0'],
    ['a comma at the end of each line', '8.2,50,0,\n16.1,50,50.0,\n32.3,25,0,\n'],
    ['semicolons', '8.2;50;0\n16.1;50;50.0\n32.3;25;0\n'],
    ['semicolons and decimal commas', '8,2;50;0\n16,1;50,00;50,0\n32,3;25;0\n'],
    ['tabs', '8.2\t50\t0\n16.1\t50\t50.0\n32.3\t25\t0\n'],
    ['tabs and decimal commas', '8,2\t50\t0\n16,1\t50\t50,0\n32,3\t25\t0\n'],
    ['blanks', '  8.2  50  0\n 16.1  50 50.0\n 32.3\t25  0  \n'],
    ['blanks and decimal commas', '8,2 50 0\n16,1 50 50,0\n32,3 25 0\n'],
    ['LF', '8.2,50,0\n16.1,50,50\n32.3,25,0\n'],
    ['CR LF', '8.2,50,0\r\n16.1,50,50\r\n32.3,25,0\r\n'],
    ['CR', '8.2,50,0\r16.1,50,50\r32.3,25,0\r'],
    ['blank lines', '\n\n8.2,50,0\n\n16.1,50,50\n  \n32.3,25,0\n\n\n'],
    ['comments', '# a\n! b\n8.2,50,0\n% c\n16.1,50,50\n// d\n; e\n32.3,25,0\n#'],
    ['a preamble', 'Notes of a sweep\nPoints,3\nf,R,X\n8.2,50,0\n16.1,50,50\n32.3,25,0\n'],
    ['names and units', 'f,R,X\nMHz,ohm,ohm\n8.2,50,0\n16.1,50,50\n32.3,25,0\n'],
    ['a delimiter announced', 'sep=;\nf;R;X\n8,2;50;0\n16,1;50;50\n32,3;25;0\n'],
    ['a comma announced', 'sep=,\r\n# a\r\n8.2,50,0\r\n! b\r\n16.1,50,50\r\n32.3,25,0\r\n'],
    ['a tab announced', 'sep=\t\n8.2\t50\t0\n16.1\t50\t50\n32.3\t25\t0\n'],
    ['quotes', '"f","R","X"\n"8.2","50","0"\n"16.1","50","50"\n"32.3","25","0"\n'],
    ['quoted decimal commas', '"8,2","50","0"\n"16,1","50,0","50"\n"32,3","25","0"\n'],
    ['quoted decimal commas and semicolons', '"8,2";50;0\n"16,1";50;50\n"32,3";25;0\n'],
    ['quotes between blanks', '"8.2" "50" 0\n16.1 50 "50"\n32.3 25 0\n'],
    [
      'quoted names with line breaks',
      '"f\nMHz",R,"X, ""series"""\n8.2,50,0\n16.1,50,50\n32.3,25,0\n',
    ],
    ['a quote inside a cell', 'Pole 5" high,a,b\n8.2,50,0\n16.1,50,50\n32.3,25,0\n'],
    ['exponents', '8.2e0,5E+1,0\n1.61e1,5e1,5.e1\n.323e2,25,0\n'],
    ['exponents with D', '8.2D0,50,0\n16.1,50,50\n32.3,2.5d1,0\n'],
    ['plus signs and many digits', '+8.2,+50.0000000000000000000,0\n16.1,50,50\n32.3,25,-0\n'],
    ['letters beyond ASCII in comments', '# Ω\n8.2,50,0\n# µ\n16.1,50,50\n32.3,25,0\n'],
  ])('reads the same with %s', (_, text) => {
    expectThePoints(text);
  });

  it('skips columns, whatever they hold', () => {
    expectThePoints('a,8.2,1:2:3,50,0\nµ,16.1,,50,50\n,32.3,x y,25,0\n', {
      columns: 'skip,frequency:MHz,skip,resistance,reactance',
    });
    expectThePoints('8.2 a 50 0\n16.1 b 50 50\n32.3\tc\t25\t0', {
      columns: '1=frequency:MHz,3=resistance,4=reactance',
    });
  });

  it('finds columns by their headers, below a preamble or behind a comment mark', () => {
    const byHeader = { columns: '"X"=reactance,"f (MHz)"=frequency:MHz,"R"=resistance' };
    expectThePoints('Notes\nR,X\nf (MHz),R,X,n\n8.2,50,0,1\n16.1,50,50,2\n32.3,25,0,3', byHeader);
    expectThePoints('# f (MHz), R, X\n8.2,50,0\n16.1,50,50\n32.3,25,0', byHeader);
    expectThePoints('f (MHz),R,X\n8.2,50,0\n16.1,50,50\n32.3,25,0', {
      columns: '1=frequency:MHz,"R"=resistance,"X"=reactance',
    });
  });

  it('is read as told where the writing leaves a choice', () => {
    const read = readText('14,000;1,500\n14,100;1,250\n', {
      columns: `${swrColumns},decimal=comma,delimiter=semicolon`,
    });
    expect([...read.sweep.frequencyHz]).toEqual([14_000_000, 14_100_000]);
    expect(assumedIn(read)).toEqual([]);
  });

  it('tells that it took commas for decimal marks', () => {
    const read = readText('14,0;1,5\n14,1;1,25\n', { columns: swrColumns });
    expect(read.assumptions).toEqual([expect.objectContaining({ code: 'decimal_comma', line: 1 })]);
  });

  it('takes the decimal mark from the whole text where the first rows have none', () => {
    const whole = Array.from({ length: 100 }, (_, i) => `${7000 + i};2`);
    const kilohertz = { columns: 'frequency:kHz,swr,reference=50' };
    const last = (end: string) =>
      readText([...whole, end].join('\n'), kilohertz).sweep.frequencyHz[100];
    expect(last('7100,5;2')).toBe(7_100_500);
    expect(last('7100.5;2')).toBe(7_100_500);
    expect(last('7100;2')).toBe(7_100_000);
  });
});

describe('a mapping that breaks the grammar', () => {
  it('is refused before the text is read', () => {
    const error = refusalOf('14,1.5\n', { columns: 'frequency:MHz;swr' });
    expect(error).toMatchObject({ code: 'columns_unit_unknown', parameter: 'columns' });
  });
});

describe('delimited text that could be read in two ways', () => {
  it('is refused where every comma may part thousands', () => {
    const error = refusalOf('14,000;1,500\n14,100;1,250\n', { columns: swrColumns });
    expect(error).toMatchObject({ code: 'decimal_ambiguous', line: 1 });
    expect(error.remedy).toContain('decimal=comma');
    expect(refusalOf('MHz;SWR\n14,000;1,500\n').code).toBe('decimal_ambiguous');
  });

  it.each(['0,500;1,500', '7000,123;1,500', '14,1;1,500', ',123;1,500'])(
    'is read where one comma cannot: %s',
    (row) => {
      const { assumptions } = readText(`${row}\n`, { columns: 'frequency:kHz,swr,reference=50' });
      expect(assumptions.map(({ code }) => code)).toContain('decimal_comma');
    },
  );

  it('is refused where two delimiters fit alike', () => {
    const error = refusalOf('a;1,2,b;3\nc;2,3,d;4\n', { columns: 'frequency:MHz,swr' });
    expect(error.code).toBe('dialect_ambiguous');
    expect(error.remedy).toContain('delimiter=');
  });
});

describe('rows that are not as they should be', () => {
  it.each([
    ['another width, more', '14,50,0\n14.1,50,0,1\n', 'row_width', 2],
    ['another width, less', '14,50,0\n14.1,50\n', 'row_width', 2],
    ['more columns than told', '14,50,0,1\n14.1,50,0,1\n', 'row_width', 1],
    ['fewer columns than told', '14,50\n14.1,50\n', 'row_width', 1],
    ['a first row at fault', '14x,50,0\n14.1,50,0\n', 'unit_in_cell', 1],
    ['a first row without frequency', ',50,0\n14.1,50,0\n', 'frequency_missing', 1],
    ['a decimal comma between points', '14.0;50;0\n14.1;50,1;0\n', 'not_a_number', 2],
    ['a point between decimal commas', '14,0;50;0\n14,1;50;0\n14.2;50;0\n', 'not_a_number', 3],
    ['a word', '14,50,0\n14.1,fifty,0\n', 'not_a_number', 2],
    ['a footer', '14,50,0\nlowest,50,0\n', 'not_a_number', 2],
    ['a unit', '14,50,0\n14.1,50 ohm,0\n', 'unit_in_cell', 2],
    ['a complex number', '14,50,0\n14.1,50+j3.2,0\n', 'complex_in_cell', 2],
    ['marks between thousands', "14,50,0\n14.1,1'000.0,0\n", 'digits_grouped', 2],
    ['a space that is no blank', '14,50,0\n14.1,50\u00a0,0\n', 'not_a_number', 2],
    ['a hexadecimal number', '14,50,0\n14.1,0x32,0\n', 'not_a_number', 2],
    ['a number beyond all range', '14,50,0\n14.1,1e999,0\n', 'not_a_number', 2],
    [
      'a cell without end',
      `14,50,0\n14.1,${'5'.repeat(30)}${'x'.repeat(90)},0\n`,
      'not_a_number',
      2,
    ],
    ['no frequency', '14,50,0\n,50,0\n', 'frequency_missing', 2],
    ['a frequency that is no number', '14,50,0\nnan,50,0\n', 'not_a_number', 2],
    ['a negative frequency', '14,50,0\n-1,50,0\n', 'frequency_negative', 2],
    ['only names', 'a,b\n1,2\n', 'row_width', 2],
  ])('are refused: %s', (_, text, code, line) => {
    const error = refusalOf(text, { columns });
    expect(error).toMatchObject({ code, line });
    expect(error.remedy).not.toBe('');
  });

  it('name the column, counted in characters of the line', () => {
    expect(refusalOf('14,50,0\n14.1, fifty,0\n', { columns })).toMatchObject({
      line: 2,
      column: 7,
    });
  });

  it('name no column where quotes have moved the cells', () => {
    const error = refusalOf('14,"50",0\n14.1,"fifty",0\n', { columns });
    expect(error).toMatchObject({ code: 'not_a_number', line: 2 });
    expect(error.column).toBeUndefined();
  });

  it('are refused where a quote is not closed', () => {
    const error = refusalOf('f,R,X\n14,50,0\n14.1,"50,0\n', { columns });
    expect(error).toMatchObject({ code: 'quote_not_closed', line: 3 });
  });

  it('are refused where far too much is quoted', () => {
    const row = `"14","50","${'0'.repeat(200)}"\n`;
    expect(refusalOf(row.repeat(20_000), { columns }).code).toBe('too_much_quoted');
  });

  it('are refused where a header is not found, or found twice', () => {
    const wanted = { columns: '"f"=frequency:MHz,"SWR"=swr' };
    expect(refusalOf('f,swr\n14,1.5\n', wanted)).toMatchObject({
      code: 'header_not_found',
      line: 2,
    });
    expect(refusalOf('14,1.5\n', wanted)).toMatchObject({ code: 'header_not_found', line: 1 });
    expect(refusalOf('1,f,a 2\n', wanted)).toMatchObject({ code: 'header_not_found' });
    expect(refusalOf('f,SWR,SWR\n14,1.5,2\n', wanted)).toMatchObject({
      code: 'header_twice',
      line: 1,
    });
    const both = { columns: '2=frequency:MHz,"SWR"=swr' };
    expect(refusalOf('f,SWR\n14,1.5\n', both)).toMatchObject({ code: 'columns_twice', line: 1 });
  });

  it('are refused where the frequency is in another column', () => {
    const error = refusalOf('a,14,1.5\nb,14.1,1.5\n', { columns: 'frequency:MHz,swr,skip' });
    expect(error.code).toBe('no_points');
  });

  it('are refused where they do not reach the column that is asked for', () => {
    const error = refusalOf('14,1.5\n', { columns: '1=frequency:MHz,4=swr' });
    expect(error).toMatchObject({ code: 'row_width', line: 1 });
    expect(error.detail).toContain('reaches to column 4');
  });
});

describe('points', () => {
  it('in descending order are turned round, and that is told', () => {
    const read = readText('14.2,1.2\n14.1,1.5\n14,2\n', { columns: swrColumns });
    expect([...read.sweep.frequencyHz]).toEqual([14_000_000, 14_100_000, 14_200_000]);
    expect(scalarOf(read).reflectionMagnitude[0]).toBeCloseTo(1 / 3, 12);
    expect(assumedIn(read)).toEqual(['points_reversed']);
  });

  it('in no order are sorted, and that is told', () => {
    const read = readText('14,2\n14.2,1.2\n14.1,1.5\n', { columns: swrColumns });
    expect(scalarOf(read).reflectionMagnitude[1]).toBeCloseTo(0.2, 12);
    expect(assumedIn(read)).toEqual(['points_sorted']);
  });

  it('that stand twice are taken once if they are equal, else refused', () => {
    const read = readText('14,2\n14,2\n14.1,1.5\n', { columns: swrColumns });
    expect(read.sweep.frequencyHz).toHaveLength(2);
    expect(assumedIn(read)).toEqual(['points_twice']);
    expect(refusalOf('14,2\n14,1.9\n', { columns: swrColumns })).toMatchObject({
      code: 'frequency_twice',
      line: 2,
    });
  });

  it.each(['>10', '<1.1', '>= 9.99', 'inf', '∞', 'nan', '---', '', 'n/a', '1.#INF', '>10:1'])(
    'whose SWR is `%s` are left out, and that is told',
    (cell) => {
      const read = readText(`14,1.5:1\n14.1,${cell}\n14.2,1:2\n`, { columns: swrColumns });
      expect([...read.sweep.frequencyHz]).toEqual([14_000_000, 14_200_000]);
      expect(scalarOf(read).reflectionMagnitude[1]).toBeCloseTo(1 / 3, 12);
      expect(read.assumptions).toEqual([
        expect.objectContaining({ code: 'points_left_out', line: 2 }),
      ]);
    },
  );

  it('that are left out are counted, the first of them named', () => {
    const rows = Array.from({ length: 10 }, (_, i) => `${14 + i},${i < 7 ? '---' : 2}`);
    const [assumption] = readText(rows.join('\n'), { columns: swrColumns }).assumptions;
    expect(assumption.detail).toContain('line 1, 2, 3, 4, 5 and 2 more');
  });

  it('are too few if all are left out', () => {
    const error = refusalOf('14,---\n14.1,inf\n', { columns: swrColumns });
    expect(error).toMatchObject({ code: 'no_points', line: 1 });
  });

  it('an SWR ratio of two numbers other than one is refused', () => {
    expect(refusalOf('14,2\n14.1,3:2\n', { columns: swrColumns }).code).toBe('not_a_number');
  });

  it('that reflect more than arrives are kept, and that is told', () => {
    const read = readText('14,1.02,0\n', {
      columns: 'frequency:MHz,reflection_re,reflection_im,reference=50',
    });
    expect(assumedIn(read)).toEqual(['reflection_above_one']);
  });

  it('at zero frequency are kept, and that is told', () => {
    const read = readText('0,2\n14,1.5\n', { columns: swrColumns });
    expect(assumedIn(read)).toEqual(['zero_frequency']);
  });

  it('at frequencies where no antenna works raise the question of the unit', () => {
    expect(
      assumedIn(readText('14,2\n15,2\n', { columns: 'frequency:Hz,swr,reference=50' })),
    ).toEqual(['unit_suspect']);
    expect(
      assumedIn(readText('14,2\n15,2\n', { columns: 'frequency:GHz,swr,reference=50' })),
    ).toEqual(['unit_suspect']);
  });

  it('more than the limit are refused', () => {
    const limits = { maxBytes: 1000, maxLineLength: 100, maxPoints: 2 };
    expect(refusalOf('1,2\n2,2\n3,2\n', { columns: swrColumns, limits })).toMatchObject({
      code: 'too_many_points',
      line: 3,
    });
  });
});
