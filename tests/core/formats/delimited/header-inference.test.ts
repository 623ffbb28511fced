import { describe, expect, it } from 'vitest';
import type { ColumnsProposal } from '../../../../core/formats/read-types.ts';
import { assumedIn, complexOf, readText, refusalOf } from '../../../support/reading.ts';

function swrOf(r: number, x: number, ohms: number): number {
  const f = (r * r + x * x + ohms * ohms) / (2 * r * ohms);
  return f + Math.sqrt(f * f - 1);
}

/** A table of a resonator at 14.2 MHz under a header; `cells` makes a row from R and X. */
function table(
  header: string,
  cells: (r: number, x: number) => readonly (string | number)[],
): string {
  const lines = Array.from({ length: 21 }, (_, i) => {
    const mhz = 14 + i / 50;
    const x = 300 * (mhz / 14.2 - 14.2 / mhz);
    return [mhz.toFixed(2), ...cells(40 + i / 5, x)].join(',');
  });
  return `${header}\n${lines.join('\n')}\n`;
}

const series = (r: number, x: number) => [r.toFixed(2), x.toFixed(2)];

function proposalFor(text: string): ColumnsProposal {
  const { code, proposal, line, remedy } = refusalOf(text);
  expect(code).toBe('columns_to_confirm');
  expect(line).toBeGreaterThan(0);
  expect(remedy).not.toBe('');
  if (proposal === undefined) throw new Error('There is no proposal.');
  return proposal;
}

describe('a header that says all', () => {
  it.each([
    ['Frequency (MHz),Resistance (ohm),Reactance (ohm)', 'frequency:MHz,resistance,reactance'],
    ['freq_mhz,Rs [Ω],Xs [Ω]', 'frequency:MHz,resistance,reactance'],
    ['MHz,series resistance/ohm,series reactance/ohm', 'frequency:MHz,resistance,reactance'],
    ['f MHz,Z real (Ohms),Z imag (Ohms)', 'frequency:MHz,resistance,reactance'],
  ])('is taken at its word: %s', (header, columns) => {
    const read = readText(table(header, series));
    expect(read.columns).toBe(columns);
    expect(read.sweep.phase).toBe('signed');
    expect(read.assumptions[0]).toMatchObject({ code: 'columns_inferred', line: 1 });
    expect(read.assumptions[0].detail).toContain(columns);
  });

  it.each([
    ['MHz,SWR', (r: number, x: number) => [swrOf(r, x, 50).toFixed(2)], 'frequency:MHz,swr'],
    ['MHz,ROS', (r: number, x: number) => [swrOf(r, x, 50).toFixed(2)], 'frequency:MHz,swr'],
    ['MHz,Return loss (dB)', () => ['12.5'], 'frequency:MHz,return_loss'],
    ['MHz,S11 (dB)', () => ['-12.5'], 'frequency:MHz,reflection_db'],
    ['MHz,|S11| dB', () => ['-12.5'], 'frequency:MHz,reflection_db'],
    ['MHz,Rho', () => ['0.25'], 'frequency:MHz,reflection_magnitude'],
    ['MHz,Reflected power (%)', () => ['6.25'], 'frequency:MHz,reflected_power:percent'],
    ['MHz,Re(S11),Im(S11)', () => ['0.1', '-0.2'], 'frequency:MHz,reflection_re,reflection_im'],
    [
      'MHz,S11 magnitude,S11 phase (deg)',
      () => ['0.2', '-100'],
      'frequency:MHz,reflection_magnitude,reflection_angle:deg',
    ],
    [
      'MHz,|Γ|,Γ angle (°)',
      () => ['0.2', '190'],
      'frequency:MHz,reflection_magnitude,reflection_angle:deg',
    ],
    [
      'MHz,|Z| (ohm),Z angle (rad)',
      () => ['50', '-0.3'],
      'frequency:MHz,impedance_magnitude,impedance_angle:rad',
    ],
    [
      'MHz,Rp (kohm),Xp (kohm)',
      () => ['1', '-2'],
      'frequency:MHz,parallel_resistance:kohm,parallel_reactance:kohm',
    ],
    [
      'MHz,Conductance (mS),Susceptance (mS)',
      () => ['20', '-2'],
      'frequency:MHz,conductance:mS,susceptance:mS',
    ],
    [
      'MHz,R series (ohm),|X| (ohm)',
      () => ['50', '2'],
      'frequency:MHz,resistance,reactance_magnitude',
    ],
  ])('is taken at its word: %s', (header, cells, columns) => {
    expect(readText(table(header, cells)).columns).toBe(columns);
  });

  it('may stand over a row of units, or behind a comment mark', () => {
    const units = table('Frequency,Resistance,Reactance\nMHz,(ohm),[ohm]', series);
    expect(readText(units).columns).toBe('frequency:MHz,resistance,reactance');
    const comment = table('# Frequency (MHz), Resistance (ohm), Reactance (ohm)', series);
    expect(readText(comment).columns).toBe('frequency:MHz,resistance,reactance');
  });

  it('may be quoted and have decimal commas under it', () => {
    const text = table('"Frequency (MHz)";"SWR"', (r, x) => [swrOf(r, x, 50).toFixed(2)])
      .replaceAll(',', ';')
      .replaceAll('.', ',');
    const read = readText(text);
    expect(read.columns).toBe('frequency:MHz,swr');
    expect(assumedIn(read)).toEqual(['columns_inferred', 'decimal_comma', 'reference_assumed']);
  });

  it('passes over columns that it names as something else', () => {
    const read = readText(table('MHz,SWR,Temperature', () => ['1.5', '20']));
    expect(read.columns).toBe('frequency:MHz,swr,skip');
    expect(read.assumptions[0].detail).toContain('`Temperature`: not recognised, not read');
  });

  it('may have a delimiter at the end of every row', () => {
    expect(readText('MHz,SWR,\n14,1.5,\n14.1,1.6,\n').columns).toBe('frequency:MHz,swr');
  });
});

describe('a header that leaves doubts', () => {
  it('asks for a frequency unit that is not written, and proposes the likely one', () => {
    const at = (hz: number) => `Frequency,SWR\n${hz},1.5\n${hz * 1.01},1.4\n`;
    expect(proposalFor(at(14.1e6)).columns).toBe('frequency:Hz,swr');
    expect(proposalFor(at(7.1)).columns).toBe('frequency:MHz,swr');
    // 144 might be kilohertz: the long waves.
    expect(proposalFor(at(144)).columns).toBe('frequency:MHz,swr');
  });

  it.each([
    ['R and X alone', table('MHz,R (ohm),X (ohm)', series), 'frequency:MHz,resistance,reactance'],
    ['no unit', table('MHz,Resistance,Reactance', series), 'frequency:MHz,resistance,reactance'],
    [
      'a reactance that is never negative',
      table('MHz,Resistance (ohm),Reactance (ohm)', () => ['50', '3']),
      'frequency:MHz,resistance,reactance_magnitude',
    ],
    [
      'angles that are never negative',
      table('MHz,|Z| (ohm),Z phase (deg)', () => ['50', '3']),
      'frequency:MHz,impedance_magnitude,impedance_angle_magnitude:deg',
    ],
    [
      'an angle of nothing in particular',
      table('MHz,|Z| (ohm),Phase (deg)', () => ['50', '-3']),
      'frequency:MHz,impedance_magnitude,impedance_angle:deg',
    ],
    [
      'an angle that no impedance has',
      table('MHz,Rho,Phase (deg)', () => ['0.5', '-130']),
      'frequency:MHz,reflection_magnitude,reflection_angle:deg',
    ],
    [
      'an angle without unit, small',
      table('MHz,|Z| (ohm),Z angle', () => ['50', '-1']),
      'frequency:MHz,impedance_magnitude,impedance_angle:rad',
    ],
    [
      'an angle without unit, large',
      table('MHz,|Z| (ohm),Z angle', () => ['50', '-45']),
      'frequency:MHz,impedance_magnitude,impedance_angle:deg',
    ],
    ['a loss of something', table('MHz,Loss', () => ['12']), 'frequency:MHz,return_loss'],
    ['a dB below zero', table('MHz,dB', () => ['-12']), 'frequency:MHz,reflection_db'],
    ['S11 of no unit', table('MHz,S11', () => ['0.2']), 'frequency:MHz,reflection_magnitude'],
    ['S11 below zero', table('MHz,S11', () => ['-12']), 'frequency:MHz,reflection_db'],
    ['an SWR below one', table('MHz,SWR', () => ['0.5']), 'frequency:MHz,swr'],
    ['a magnitude above one', table('MHz,Rho', () => ['25']), 'frequency:MHz,reflection_magnitude'],
    [
      'a reflection above 0 dB',
      table('MHz,|S11| (dB)', () => ['12']),
      'frequency:MHz,reflection_db',
    ],
    ['a negative return loss', table('MHz,RL (dB)', () => ['-12']), 'frequency:MHz,return_loss'],
    [
      'a negative resistance',
      table('MHz,Resistance (ohm),Reactance (ohm)', () => ['-50', '-3']),
      'frequency:MHz,resistance,reactance',
    ],
    ['an odd unit', table('MHz,SWR (dB)', () => ['2']), 'frequency:MHz,swr'],
    ['a column without name', table('MHz,SWR,', () => ['2', '5']), 'frequency:MHz,swr,skip'],
    ['the same twice', table('MHz,SWR,VSWR', () => ['2', '2']), 'frequency:MHz,swr,skip'],
    ['no names', table('', () => ['2']), 'frequency:MHz,skip'],
    ['unknown names', table('a,b', () => ['2']), 'frequency:MHz,skip'],
    ['no frequency', table('a,SWR', () => ['2']), 'frequency:MHz,swr'],
    [
      'what can neither be used nor checked',
      table('MHz,SWR,Reactance (ohm)', () => ['2', '-5']),
      'frequency:MHz,swr,skip',
    ],
  ])('is put to the member: %s', (_, text, columns) => {
    const proposal = proposalFor(text);
    expect(proposal.columns).toBe(columns);
    expect(proposal.evidence.length).toBeGreaterThanOrEqual(3);
    expect(proposal.firstRows).toHaveLength(5);
    expect(proposal.firstRows[0][0]).toBe('14.00');
  });

  it('proposes decimal commas where it found them', () => {
    const proposal = proposalFor('MHz;R;X\n14,0;50;1,5\n14,1;51;-1,5\n');
    expect(proposal.columns).toBe('frequency:MHz,resistance,reactance,decimal=comma');
    expect(proposal.firstRows[0]).toEqual(['14,0', '50', '1,5']);
  });

  it('is put to the member where frequencies go up and down', () => {
    expect(proposalFor('MHz,SWR\n14,2\n14.2,2\n14.1,2\n').columns).toBe('frequency:MHz,swr');
  });

  it('proposes a frequency where every column is taken for something else', () => {
    expect(proposalFor('SWR,RL\n1.5,14\n1.6,13\n').columns).toBe('frequency:MHz,return_loss');
  });

  it('reads when what was proposed is sent back', () => {
    const text = table('MHz,R (ohm),X (ohm)', series);
    const { columns } = proposalFor(text);
    expect(readText(text, { columns }).columns).toBe(columns);
  });
});

describe('recomputing one column from others', () => {
  const withSwr = (ohms: number) => (r: number, x: number) => [
    ...series(r, x),
    swrOf(r, x, ohms).toFixed(2),
  ];

  it('settles what R and X are, and the reference', () => {
    const read = readText(table('MHz,R,X,SWR', withSwr(50)));
    expect(read.columns).toBe('frequency:MHz,resistance,reactance,swr,reference=50');
    expect(read.sweep.phase).toBe('signed');
    expect(assumedIn(read)).toEqual(['columns_inferred']);
    expect(read.assumptions[0].detail).toContain('at a reference of 50 ohm');
    expect(readText(table('MHz,R,X,SWR', withSwr(75))).sweep.referenceOhm).toBe(75);
  });

  it('does not settle the sign of a reactance', () => {
    const proposal = proposalFor(
      table('MHz,R,X,SWR', (r, x) => [
        r.toFixed(2),
        Math.abs(x).toFixed(2),
        swrOf(r, x, 50).toFixed(2),
      ]),
    );
    expect(proposal.columns).toBe('frequency:MHz,resistance,reactance_magnitude,swr,reference=50');
  });

  it('asks where nothing agrees', () => {
    const proposal = proposalFor(
      table('MHz,Resistance (ohm),Reactance (ohm),SWR', (r, x) => [
        ...series(r, x),
        (r / 9).toFixed(2),
      ]),
    );
    expect(proposal.evidence.join(' ')).toContain('do');
    expect(proposal.evidence.join(' ')).toContain('not agree at any usual reference');
  });

  it('asks where agreement says nothing, since all rows are alike', () => {
    expect(proposalFor(table('MHz,R,X,SWR', () => ['50', '-1', '1.0'])).columns).toContain('swr');
    expect(proposalFor('MHz,R,X,SWR\n14,50,-50,2.62\n14.1,50,50,2.62\n').columns).toContain('swr');
  });

  it('asks where no column is sure by its name', () => {
    const proposal = proposalFor(
      table('MHz,R,X,Z', (r, x) => [...series(r, x), Math.hypot(r, x).toFixed(2)]),
    );
    expect(proposal.columns).toBe('frequency:MHz,resistance,reactance,impedance_magnitude');
  });

  it('settles a column that only confirms others', () => {
    const cells = (r: number, x: number) => [
      ...series(r, x),
      ((Math.atan2(x, r) * 180) / Math.PI).toFixed(2),
    ];
    const read = readText(table('MHz,Resistance (ohm),Reactance (ohm),Phase (deg)', cells));
    expect(read.columns).toBe('frequency:MHz,resistance,reactance,impedance_angle:deg');
    expect(complexOf(read).phase).toBe('signed');
  });

  it('asks where a value has no place in its column', () => {
    const proposal = proposalFor(table('MHz,R,X,SWR', (r, x) => [...series(r, x), '0.5']));
    expect(proposal.evidence.join(' ')).toContain('no SWR is below 1');
  });
});

describe('a table without columns told', () => {
  it('is refused where no row has two numbers, or one is at fault', () => {
    expect(refusalOf('14,---\n14.1,inf\n').code).toBe('no_points');
    expect(refusalOf('MHz,SWR\n14,1.5\n14.1,x\n')).toMatchObject({ code: 'not_a_number', line: 3 });
    expect(refusalOf('MHz,SWR\n14,"1.5\n').code).toBe('quote_not_closed');
    expect(refusalOf('MHz,SWR\n14,1.5\n14,1.6\n')).toMatchObject({
      code: 'frequency_twice',
      line: 3,
    });
    expect(refusalOf('a;1,2,b;3\nc;2,3,d;4\n').code).toBe('dialect_ambiguous');
  });
});
