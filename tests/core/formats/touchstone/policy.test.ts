import { describe, expect, it } from 'vitest';
import { readSweep } from '../../../../core/formats/read-sweep.ts';
import { readTouchstone } from '../../../../core/formats/touchstone/read-touchstone.ts';
import { pointsOf, refused, taken } from './reading.ts';

// One test for each row of the policy for odd files: what is beyond doubt is taken with a word,
// what would be a guess is refused.

const good = '# MHz S RI R 50\n14 .1 .2\n15 .3 .4\n';
const goodPoints = [
  [14e6, 0.1, 0.2],
  [15e6, 0.3, 0.4],
];
const twoPort = '.1 .2 0.5 0 0.5 0 .3 .4';

function bytesOf(text: string, encoding: 'utf8' | 'utf16le' | 'latin1' = 'utf8'): Uint8Array {
  return new Uint8Array(Buffer.from(text, encoding));
}

function codesOf(bytes: Uint8Array): readonly string[] {
  const read = readSweep(bytes);
  if (!read.ok) throw new Error(read.error.code);
  return read.value.assumptions.map(({ code }) => code);
}

function errorOf(bytes: Uint8Array) {
  const read = readSweep(bytes);
  if (read.ok) throw new Error('taken');
  return read.error;
}

describe('encodings', () => {
  it('a UTF-8 byte order mark is left out', () => {
    expect(codesOf(bytesOf(`\ufeff${good}`))).toEqual(['byte_order_mark']);
  });

  it('UTF-16 is decoded where its byte order mark says so', () => {
    expect(codesOf(bytesOf(`\ufeff${good}`, 'utf16le'))).toEqual(['utf_16']);
  });

  it('zero bytes without such a mark are refused as binary', () => {
    expect(errorOf(bytesOf(good, 'utf16le')).code).toBe('binary_file');
    expect(errorOf(bytesOf(`${good}\0`)).code).toBe('binary_file');
  });

  it('Latin-1 letters are taken in comments', () => {
    expect(codesOf(bytesOf(`! 20 °C, Müller’s mast\n${good}`.replace('’', "'"), 'latin1'))).toEqual(
      ['windows_1252'],
    );
  });

  it('and refused in data', () => {
    expect(errorOf(bytesOf('# MHz S RI R 50\n14° .1 .2\n', 'latin1'))).toMatchObject({
      code: 'not_a_number',
      line: 2,
      column: 1,
    });
  });

  it.each([
    ['CR', '\r'],
    ['CR+LF', '\r\n'],
  ])('%s ends lines as LF does', (_, end) => {
    expect(pointsOf(taken(good.replaceAll('\n', end)).sweep)).toEqual(goodPoints);
  });

  it('mixed line ends keep their line numbers', () => {
    expect(refused('# MHz S RI R 50\r\n14 .1 .2\r15 .3 x\n').line).toBe(3);
  });

  it('tabs separate as blanks do', () => {
    expect(pointsOf(taken(good.replaceAll(' ', '\t')).sweep)).toEqual(goodPoints);
  });
});

describe('the option line', () => {
  it('may have blanks before it', () => {
    expect(taken(`   ${good}`).codes).toEqual([]);
  });

  it('may be glued to its mark, with a word', () => {
    const { sweep, codes } = taken(good.replace('# ', '#'));
    expect(sweep.frequencyHz[0]).toBe(14e6);
    expect(codes).toEqual(['option_glued']);
  });

  it('may not have column labels after R', () => {
    expect(refused(`# HZ S RI RS11r S11i\n14 .1 .2\n`)).toMatchObject({
      code: 'option_resistance',
      line: 1,
    });
  });

  it('may not be missing: no unit is guessed', () => {
    expect(refused('14000000 .1 .2\n')).toMatchObject({ code: 'option_line_missing', line: 1 });
  });

  it('may be given with the upload', () => {
    const { sweep, codes } = taken('14 .1 .2\n', { optionLine: '# MHz S RI R 75' });
    expect(sweep).toMatchObject({ referenceOhm: 75 });
    expect(sweep.frequencyHz[0]).toBe(14e6);
    expect(codes).toContain('option_line_given');
  });

  it('counts once: a second one like it is passed over', () => {
    expect(taken(good.replace('15', '# MHz  s ri R 50\n15')).codes).toEqual([]);
  });

  it('and one that differs is told', () => {
    expect(taken(good.replace('15', '# GHz S RI R 50\n15')).codes).toEqual(['second_option_line']);
  });

  it('may not come after the data', () => {
    expect(refused('14 .1 .2\n# MHz S RI R 50\n').code).toBe('option_line_missing');
  });

  it.each(['# sec S RI R 50', '# m S RI', '# MHz S XY R 50'])('refuses %s', (option) => {
    expect(refused(`${option}\n14 .1 .2\n`)).toMatchObject({ code: 'option_unknown', line: 1 });
  });

  it.each([
    ['# MHz S RI R (50+0j)', 50],
    ['# MHz S RI R 50+j0', 50],
    ['# MHz S RI R50', 50],
    ['# MHz S RI R=75', 75],
    ['# MHz S RI R 75 Ohm', 75],
  ])('takes %s with a word', (option, reference) => {
    const { sweep, codes } = taken(`${option}\n14 .1 .2\n`);
    expect(sweep.referenceOhm).toBe(reference);
    expect(codes).toEqual(['option_resistance_form']);
  });

  it.each(['R (50+2j)', 'R 50-j1', 'R', 'R fifty'])('refuses the reference %s', (reference) => {
    expect(refused(`# MHz S RI ${reference}\n14 .1 .2\n`).code).toMatch(/^option_/);
  });

  it.each(['R 0', 'R -50'])('refuses %s', (reference) => {
    expect(refused(`# MHz S RI ${reference}\n14 .1 .2\n`).code).toBe('reference_not_positive');
  });

  it.each([
    '# MHz GHz S RI',
    '# s S RI R 50',
    '# MHz S Z RI',
    '# MHz S RI MA',
    '# MHz R 50 S R 75 RI',
  ])('refuses two things of one kind: %s', (option) => {
    expect(refused(`${option}\n14 .1 .2\n`).code).toBe('option_twice');
  });

  it('gives resistances of several ports only as its last words', () => {
    expect(refused(`# MHz R 50 75 S RI\n14 ${twoPort}\n`).code).toBe('option_resistance');
    expect(refused(`# MHz S RI R 50 75 90\n14 ${twoPort}\n`).code).toBe('references_differ');
  });
});

describe('comments', () => {
  it('may stand anywhere, also inside a reference of several lines', () => {
    const text = `[Version] 2.0\n# MHz S RI\n[Number of Ports] 2 ! two\n[Two-Port Data Order] 21_12\n[Number of Frequencies] 1\n[Reference] 50 ! first\n! between\n75 ! second\n[Network Data]\n14 ${twoPort}\n[End] ! done\n`;
    const { sweep, codes } = taken(text, { port: 2 });
    expect(sweep.referenceOhm).toBe(75);
    expect(codes).toEqual(['other_port_matched']);
  });

  it('that name another reference are told and not obeyed', () => {
    const { sweep, codes } = taken(good.replace('15', '! Port Impedance 75.0 0.1\n15'));
    expect(sweep.referenceOhm).toBe(50);
    expect(codes).toEqual(['comment_names_reference']);
  });
});

describe('numbers', () => {
  it('with decimal commas are taken where none has a point', () => {
    const { sweep, codes } = taken('# MHz S RI R 50\n14,5 0,1 0,2\n15,5 0,3 0,4\n');
    expect(pointsOf(sweep)).toEqual([
      [14.5e6, 0.1, 0.2],
      [15.5e6, 0.3, 0.4],
    ]);
    expect(codes).toEqual(['decimal_comma']);
  });

  it('with both commas and points are refused', () => {
    expect(refused('# MHz S RI R 50\n14,5 0.1 0,2\n')).toMatchObject({
      code: 'decimal_mixed',
      line: 2,
    });
  });

  it('whose commas may all part thousands are refused', () => {
    expect(refused('# kHz S RI R 50\n14,000 1 0\n14,500 1 0\n')).toMatchObject({
      code: 'decimal_ambiguous',
      line: 2,
    });
    expect(taken('# MHz S RI R 50\n14,000 0,123 0\n').codes).toEqual(['decimal_comma']);
  });

  it.each(['14,0.1,0.2', '14;0.1;0.2', '14, 0.1, 0.2'])('%s is delimited text', (row) => {
    expect(refused(`# MHz S RI R 50\n${row}\n`)).toMatchObject({
      code: 'separator_not_blank',
      line: 2,
    });
  });

  it('with a Fortran exponent are taken with a word', () => {
    const { sweep, codes } = taken('# MHz S RI R 50\n1.4D+01 1.0d-01 2D-1\n');
    expect(pointsOf(sweep)).toEqual([[14e6, 0.1, 0.2]]);
    expect(codes).toEqual(['fortran_exponent']);
  });

  it.each(['1.2+3', '0x10', '1_0', '1e', '1e999', '--1', '5..', '１'])('%s is none', (token) => {
    expect(refused(`# MHz S RI R 50\n14 ${token} .2\n`)).toMatchObject({
      code: 'not_a_number',
      line: 2,
      column: 4,
    });
  });

  it.each(['NaN', 'nan', '1.#IND', 'Inf', '-1.#QNAN'])('%s drops its point', (token) => {
    const { sweep, codes } = taken(`# MHz S RI R 50\n14 ${token} .2\n15 .3 .4\n`);
    expect(pointsOf(sweep)).toEqual([[15e6, 0.3, 0.4]]);
    expect(codes).toEqual(['points_left_out']);
  });

  it('of minus infinity decibels are zero', () => {
    expect(pointsOf(taken('# MHz S DB R 50\n14 -Inf 0\n').sweep)).toEqual([[14e6, 0, 0]]);
  });

  it('that are none in every point leave nothing to keep', () => {
    expect(refused('# MHz S RI R 50\n14 nan nan\n').code).toBe('no_points');
  });

  it('with a negative magnitude are turned by half a circle', () => {
    const { sweep, codes } = taken('# MHz S MA R 50\n14 -0.5 0\n');
    expect(sweep.reflectionRe[0]).toBe(-0.5);
    expect(codes).toEqual(['magnitude_negative']);
  });
});

describe('reflections above one', () => {
  it('are kept with a word, as residues of a calibration', () => {
    const read = readTouchstone('# MHz S RI R 50\n14 1 0\n15 1.01 0\n', {
      limits: { maxPoints: 9 },
    });
    if (!read.ok) throw new Error(read.error.code);
    expect(read.value.sweep).toMatchObject({ reflectionRe: Float64Array.of(1, 1.01) });
    expect(read.value.assumptions).toMatchObject([{ code: 'reflection_above_one', line: 3 }]);
  });
});

describe('frequencies', () => {
  it('that stand twice with equal values are taken once', () => {
    const { sweep, codes } = taken(`${good}15 .3 .4\n`);
    expect(pointsOf(sweep)).toEqual(goodPoints);
    expect(codes).toEqual(['points_twice']);
  });

  it('that stand twice with other values are refused', () => {
    expect(refused(`${good}15 .3 .5\n`)).toMatchObject({ code: 'frequency_twice', line: 4 });
  });

  it('in descending order are sorted in a one-port file', () => {
    const { sweep, codes } = taken('# MHz S RI R 50\n15 .3 .4\n14 .1 .2\n');
    expect(pointsOf(sweep)).toEqual(goodPoints);
    expect(codes).toEqual(['points_sorted']);
  });

  it('may not step back in a two-port file, where that would begin the noise', () => {
    const text = `# MHz S RI R 50\n15 ${twoPort}\n14 ${twoPort}\n`;
    expect(refused(text, { port: 1 })).toMatchObject({ code: 'frequency_steps_back', line: 3 });
  });

  it('of zero are kept with a word', () => {
    expect(taken('# MHz S RI R 50\n0 1 0\n1 .9 0\n').codes).toEqual(['zero_frequency']);
  });

  it('below zero are refused', () => {
    expect(refused('# MHz S RI R 50\n-1 1 0\n')).toMatchObject({
      code: 'sweep_frequency_negative',
      line: 2,
    });
  });

  it.each(['# GHz S RI R 50\n14.1 .1 .2\n', '# Hz S RI R 50\n14.1 .1 .2\n'])(
    'of an unlikely unit are told',
    (text) => {
      expect(taken(text).codes).toEqual(['unit_suspect']);
    },
  );
});

describe('noise rows', () => {
  const points = `# GHz S RI R 50\n1 ${twoPort}\n2 ${twoPort}\n`;

  it('may begin at the last frequency itself', () => {
    expect(taken(`${points}2 .7 .6 69 .4\n3 .8 .5 70 .4\n`, { port: 1 }).codes).toContain(
      'noise_passed_over',
    );
  });

  it('with nonsense in them are passed over all the same', () => {
    expect(taken(`${points}1 .7 1 69 .4\n`, { port: 1 }).sweep.frequencyHz).toHaveLength(2);
  });

  it('may not begin above the last frequency, nor go back', () => {
    expect(refused(`${points}3 .7 .6 69 .4\n`, { port: 1 })).toMatchObject({ line: 4 });
    expect(refused(`${points}2 .7 .6 69 .4\n1 .7 .6 69 .4\n`, { port: 1 })).toMatchObject({
      line: 5,
    });
  });
});

describe('rows and ports', () => {
  it.each(['14 .1', '14 .1 .2 .3', '14'])('a row of wrong length is refused: %s', (row) => {
    expect(refused(`# MHz S RI R 50\n${row}\n`)).toMatchObject({ code: 'row_width', line: 2 });
  });

  it('lines of a one-port file are never put together', () => {
    expect(refused('# MHz S RI R 50\n14\n.1 .2\n')).toMatchObject({ code: 'row_width', line: 2 });
  });

  it('a two-port point over two lines is put together with a word', () => {
    const text = '# MHz S RI R 50\n14 .1 .2 .5 0\n.5 0 .3 .4\n15 .1 .2 .5 0\n.5 0 .6 .7\n';
    const { sweep, codes } = taken(text, { port: 2 });
    expect(pointsOf(sweep)).toEqual([
      [14e6, 0.3, 0.4],
      [15e6, 0.6, 0.7],
    ]);
    expect(codes).toContain('point_wrapped');
  });

  it('a name of two ports over rows of three is told', () => {
    expect(taken(good, { fileName: 'a.s2p' }).codes).toEqual(['name_says_two_ports']);
  });

  it('a name of one port over rows of nine is refused, unless the port is said', () => {
    const text = `# MHz S RI R 50\n14 ${twoPort}\n`;
    expect(refused(text, { fileName: 'a.S1P' }).code).toBe('ports_differ');
    expect(taken(text, { fileName: 'a.s1p', port: 1 }).port).toBe(1);
  });

  it('entries of exact zero count as not measured', () => {
    const { codes } = taken('# MHz S RI R 50\n14 .1 .2 0 0 0 0 0 0\n', { port: 1 });
    expect(codes).toEqual(['others_not_measured']);
  });

  it('which are minus infinity in decibels, where zero is the whole', () => {
    const row = (other: string) => `# MHz S DB R 50\n14 -10 0 ${other} ${other} ${other}\n`;
    expect(taken(row('-inf 0'), { port: 1 }).codes).toEqual(['others_not_measured']);
    expect(taken(row('0 0'), { port: 1 }).codes).toEqual(['other_port_matched']);
  });

  it('a port of which nothing was measured is refused', () => {
    const text = '# MHz S RI R 50\n14 .1 .2 0 0 0 0 0 0\n15 .1 .2 .5 0 .5 0 0 0\n';
    expect(refused(text, { port: 2 })).toMatchObject({ code: 'port_not_measured', line: 2 });
    const turned = '# MHz S RI R 50\n14 0 0 0 0 0 0 .1 .2\n';
    expect(refused(turned)).toMatchObject({ code: 'port_not_measured' });
    expect(taken(turned, { port: 2 }).codes).toEqual(['others_not_measured']);
  });

  it('two of four immittances do not say what the reflection is', () => {
    expect(refused('# MHz Z RI R 50\n14 1 0 .5 0\n').code).toBe('parameters_incomplete');
  });

  it.each(['H', 'G'])('%s-parameters take two ports', (parameter) => {
    expect(refused(`# MHz ${parameter} RI R 50\n14 1 0\n`)).toMatchObject({
      code: 'parameters_incomplete',
      line: 2,
    });
  });

  it('rows of five are S11 and S21', () => {
    const text = '# MHz S RI R 50\n14 .1 .2 .5 0\n15 .3 .4 .5 0\n';
    const { sweep, codes } = taken(text);
    expect(pointsOf(sweep)).toEqual(goodPoints);
    expect(codes).toContain('forward_only');
    expect(refused(text, { port: 2 }).code).toBe('port_absent');
  });

  it('a port that nobody named is taken as the first, with a word', () => {
    expect(taken(`# MHz S RI R 50\n14 ${twoPort}\n`).codes).toEqual([
      'port_assumed',
      'other_port_matched',
    ]);
  });

  it('a port that the file lacks is refused', () => {
    expect(refused(good, { port: 2 }).code).toBe('port_absent');
  });

  it('any name will do, and none', () => {
    for (const fileName of ['SWEEP.TS', 'x.dat', 'x']) {
      expect(taken(good, { fileName }).codes).toEqual([]);
    }
  });
});

describe('version 2', () => {
  const file = ({ version = '2.0', count = '1', rest = '', end = '[End]\n' } = {}) =>
    `[Version] ${version}\n# MHz S RI\n[Number of Ports] 1\n[Number of Frequencies] ${count}\n${rest}[Network Data]\n14 .1 .2\n${end}`;

  it('has its points kept where their count differs from what it says', () => {
    expect(taken(file({ count: '3' })).codes).toEqual(['frequencies_differ']);
  });

  it('may lack its end', () => {
    expect(taken(file({ end: '' })).codes).toEqual(['end_missing']);
  });

  it('may have nothing after its end', () => {
    expect(refused(file({ end: '[End]\n15 .1 .2\n' })).code).toBe('data_after_end');
  });

  it.each(['2.2', '3.0', ''])('refuses version `%s`', (version) => {
    expect(refused(file({ version })).code).toBe('version_unknown');
  });

  it('refuses mixed modes: their first entry is no reflection at a port', () => {
    expect(refused(file({ rest: '[Mixed-Mode Order] D1,2 C1,2\n' })).code).toBe('mixed_mode');
  });

  it('passes over its information block and unknown keywords before the data', () => {
    const rest = '[Begin Information]\nanything 1 2 3\n[End Information]\n[Colour] blue\n';
    expect(taken(file({ rest })).codes).toEqual(['keyword_unknown']);
  });

  it('refuses unknown keywords after the data', () => {
    expect(refused(file({ end: '[Colour] blue\n' })).code).toBe('keyword_unknown');
  });

  it('refuses complex, missing or surplus references', () => {
    expect(refused(file({ rest: '[Reference] (50,1)\n' })).code).toBe('reference_not_positive');
    expect(refused(file({ rest: '[Reference]\n' })).code).toBe('reference_short');
    expect(refused(file({ rest: '[Reference] 50 75\n' })).code).toBe('reference_not_positive');
  });

  it('refuses more ports than two before anything grows with them', () => {
    const text = file().replace('Ports] 1', 'Ports] 1000000000');
    expect(refused(text).code).toBe('too_many_ports');
  });

  it('refuses a frequency in the middle of a line and numbers left over', () => {
    expect(refused(file().replace('14 .1 .2', '14 .1 .2 15 .3 .4')).code).toBe(
      'frequency_not_first',
    );
    expect(refused(file().replace('14 .1 .2', '14 .1 .2 15')).code).toBe('row_width');
  });

  it('has keywords only behind its version, and data only behind [Network Data]', () => {
    expect(refused('[Number of Ports] 1\n').code).toBe('version_missing');
    expect(refused('# MHz S RI\n[Number of Ports] 1\n14 .1 .2\n').code).toBe(
      'keyword_without_version',
    );
    expect(refused('[Version] 2.0\n# MHz S RI\n14 .1 .2\n').code).toBe('data_before_network');
    expect(refused('[Version] 2.0\n[Number of Ports] 1\n').code).toBe('option_line_missing');
  });
});

describe('immittances', () => {
  it('that look like plain ohms in version 1 are told, and can be read as such', () => {
    const text = '# MHz Z RI R 50\n14 60 20\n15 55 -10\n';
    expect(taken(text).codes).toEqual(['immittance_suspect']);
    const plain = taken(text, { immittanceNormalised: false });
    expect(plain.codes).toEqual([]);
    expect(plain.sweep.reflectionRe[0]).toBeCloseTo(0.12, 12);
  });

  it('normalised to unequal references are not defined', () => {
    expect(refused(`# MHz Z RI R 50 75\n14 ${twoPort}\n`, { port: 1 }).code).toBe(
      'references_differ',
    );
  });
});

describe('limits', () => {
  it('a file of more points than are read is refused', () => {
    const read = readSweep(bytesOf(good), {
      limits: { maxBytes: 1000, maxLineLength: 100, maxPoints: 1 },
    });
    expect(read).toMatchObject({ ok: false, error: { code: 'too_many_points' } });
  });

  it('a file without data lines has no points', () => {
    expect(refused('# MHz S RI R 50\n! nothing\n').code).toBe('no_points');
  });
});
