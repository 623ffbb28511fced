import { describe, expect, it } from 'vitest';
import { assumedIn, complexOf, readText, refusalOf, scalarOf } from '../../../support/reading.ts';

// The half-wave dipole, 73.1 + j42.5 ohm (C. A. Balanis, Antenna Theory, induced EMF method), at 50
// ohm. Reflection, SWR, return loss, admittance and parallel form computed outside this project.
const re = 0.274168537;
const im = 0.250591691;
const swr = 2.181855;
const returnLossDb = 8.602324;
const size = Math.sqrt(73.1 ** 2 + 42.5 ** 2);
const rho = Math.sqrt(re ** 2 + im ** 2);
const degrees = 180 / Math.PI;
const angleDeg = Math.atan2(42.5, 73.1) * degrees;
const reflectionDeg = Math.atan2(im, re) * degrees;

function read(columns: string, ...cells: number[]) {
  const rows = [14, 14.1].map((mhz) => [mhz, ...cells].join(','));
  return readText(rows.join('\n'), { columns: `frequency:MHz,${columns}` });
}

describe('the half-wave dipole', () => {
  it.each([
    ['resistance,reactance', [73.1, 42.5]],
    ['resistance:kohm,reactance:kohm', [0.0731, 0.0425]],
    ['reflection_re,reflection_im', [re, im]],
    ['reflection_magnitude,reflection_angle:deg', [rho, reflectionDeg]],
    ['reflection_magnitude:percent,reflection_angle:rad', [100 * rho, reflectionDeg / degrees]],
    ['reflection_db,reflection_angle:deg', [-returnLossDb, reflectionDeg]],
    ['return_loss,reflection_angle:deg', [returnLossDb, reflectionDeg]],
    ['swr,reflection_angle:deg', [swr, reflectionDeg]],
    ['reflected_power:fraction,reflection_angle:deg', [rho * rho, reflectionDeg]],
    ['reflected_power:percent,reflection_angle:deg', [100 * rho * rho, reflectionDeg]],
    ['impedance_magnitude,impedance_angle:deg', [size, angleDeg]],
    ['impedance_magnitude,impedance_angle:rad', [size, angleDeg / degrees]],
    ['conductance:S,susceptance:S', [0.0102239764, -0.0059441723]],
    ['conductance:mS,susceptance:mS', [10.2239764, -5.9441723]],
    ['parallel_resistance,parallel_reactance', [97.809302, 168.232]],
  ])('is the same from %s, its sign known', (columns, cells) => {
    const sweep = complexOf(read(columns, ...cells));
    expect(sweep.phase).toBe('signed');
    expect(sweep.reflectionRe[1]).toBeCloseTo(re, 5);
    expect(sweep.reflectionIm[1]).toBeCloseTo(im, 5);
    expect(sweep.frequencyHz[1]).toBe(14_100_000);
  });

  it.each([
    ['resistance,reactance_magnitude', [73.1, 42.5]],
    ['reflection_re,reflection_im_magnitude', [re, im]],
    ['swr,reflection_angle_magnitude:deg', [swr, reflectionDeg]],
    ['impedance_magnitude,impedance_angle_magnitude:deg', [size, angleDeg]],
    ['resistance,impedance_magnitude', [73.1, size]],
    ['impedance_magnitude,swr', [size, swr]],
    ['impedance_magnitude,return_loss', [size, returnLossDb]],
    ['resistance,swr', [73.1, swr]],
    ['resistance,reflection_db', [73.1, -returnLossDb]],
  ])('is the same from %s, its sign unknown', (columns, cells) => {
    const sweep = complexOf(read(columns, ...cells));
    expect(sweep.phase).toBe('unsigned');
    expect(sweep.reflectionRe[1]).toBeCloseTo(re, 5);
    expect(sweep.reflectionIm[1]).toBeCloseTo(im, 5);
  });

  it.each([
    ['swr', swr],
    ['return_loss', returnLossDb],
    ['reflection_db', -returnLossDb],
    ['reflection_magnitude', rho],
    ['reflection_magnitude:percent', 100 * rho],
    ['reflected_power:percent', 100 * rho * rho],
  ])('has the same mismatch from %s alone', (columns, cell) => {
    expect(scalarOf(read(columns, cell)).reflectionMagnitude[0]).toBeCloseTo(rho, 6);
  });
});

describe('the sign of the reactance', () => {
  it('is kept as told, and an SWR of the same file agrees with either', () => {
    expect(
      complexOf(read('resistance,reactance,swr', 73.1, -42.5, 2.182)).reflectionIm[0],
    ).toBeLessThan(0);
    expect(
      complexOf(read('resistance,reactance,swr', 73.1, 42.5, 2.182)).reflectionIm[0],
    ).toBeGreaterThan(0);
  });
});

describe('SWR and return loss', () => {
  // Handbook table of SWR against return loss, recomputed: 20 log10((s+1)/(s-1)).
  it.each([
    [1.1, 26.4443858947],
    [1.5, 13.9794000867],
    [2, 9.54242509439],
    [3, 6.02059991328],
    [10, 1.74300351438],
  ])('%d:1 and %d dB are the same reflection', (ratio, lossDb) => {
    const bySwr = scalarOf(read('swr', ratio)).reflectionMagnitude[0];
    const byLoss = scalarOf(read('return_loss', lossDb)).reflectionMagnitude[0];
    expect(byLoss).toBeCloseTo(bySwr, 9);
  });
});

describe('a parallel form with a short', () => {
  it('is a short', () => {
    const sweep = complexOf(read('parallel_resistance,parallel_reactance', 0, 5));
    expect([sweep.reflectionRe[0], sweep.reflectionIm[0]]).toEqual([-1, 0]);
  });
});

describe('the reference', () => {
  it('is what was told', () => {
    const { sweep } = read('swr,reference=75', 1.5);
    expect(sweep.referenceOhm).toBe(75);
  });

  it('is assumed, and told, where reflection or SWR need one', () => {
    const assumed = read('swr', 1.5);
    expect(assumed.sweep.referenceOhm).toBe(50);
    expect(assumedIn(assumed)).toEqual(['reference_assumed']);
    expect(assumedIn(read('swr,reference=50', 1.5))).toEqual([]);
  });

  it('needs no assumption for an impedance, which holds without', () => {
    expect(assumedIn(read('resistance,reactance', 73.1, 42.5))).toEqual([]);
  });
});

describe('columns that cannot make a sweep', () => {
  it.each([
    ['resistance', 'columns_insufficient'],
    ['swr,reactance', 'columns_unused'],
    ['swr,impedance_angle:deg', 'columns_unused'],
    ['skip', 'columns_insufficient'],
  ])('%s: %s', (columns, code) => {
    const wide = columns.includes(',') ? '14,2,3' : '14,2';
    const error = refusalOf(`${wide}\n`, { columns: `frequency:MHz,${columns}` });
    expect(error).toMatchObject({ code, parameter: 'columns' });
  });

  it('a point at minus the reference has no reflection', () => {
    const error = refusalOf('14,-50,0\n', { columns: 'frequency:MHz,resistance,reactance' });
    expect(error).toMatchObject({ code: 'reflection_not_finite', line: 1 });
  });
});

describe('two magnitudes for one impedance', () => {
  const columns = (what: string) => ({ columns: `frequency:MHz,${what}` });

  it('that fit only within their rounding have no reactance there', () => {
    const read = readText('7,50.1,1.00\n7.1,60,1.5\n', columns('resistance,swr,reference=50'));
    expect(complexOf(read).reflectionIm[0]).toBe(0);
    expect(assumedIn(read)).toEqual(['reactance_computed', 'reactance_within_rounding']);
    const sizes = readText('7,50.1,50.0\n', columns('resistance,impedance_magnitude'));
    expect(complexOf(sizes).reflectionIm[0]).toBe(0);
    const match = readText('7,50.1,1.00\n', columns('impedance_magnitude,swr,reference=50'));
    expect(complexOf(match).reflectionIm[0]).toBe(0);
  });

  it.each([
    ['resistance,swr', '200,1.5'],
    ['resistance,swr', '20,1.5'],
    ['resistance,impedance_magnitude', '60,50'],
    ['impedance_magnitude,swr', '200,1.5'],
    ['impedance_magnitude,swr', '20,1.5'],
  ])('that cannot both hold are refused: %s of %s', (what, cells) => {
    expect(refusalOf(`7,${cells}\n`, columns(what))).toMatchObject({
      code: 'columns_contradict',
      line: 1,
    });
  });
});

describe('values that a quantity cannot have', () => {
  it.each([
    ['swr', '0.5', 'swr_below_one'],
    ['swr', '-1', 'swr_below_one'],
    ['reflection_magnitude', '-0.1', 'magnitude_negative'],
    ['reflected_power:percent', '-3', 'magnitude_negative'],
    ['resistance,reactance_magnitude', '50,-3', 'magnitude_negative'],
    ['impedance_magnitude,impedance_angle_magnitude:deg', '50,-3', 'magnitude_negative'],
    ['impedance_magnitude,impedance_angle:deg', '50,150', 'angle_not_of_impedance'],
    ['impedance_magnitude,impedance_angle:rad', '50,45', 'angle_not_in_radians'],
    ['reflection_db', '12', 'reflection_db_sign'],
  ])('%s of %s is refused as %s, with the line', (what, cells, code) => {
    const first = what.includes(',') ? '14,50,0.1' : '14,1.5';
    const text = what === 'reflection_db' ? `14,${cells}\n` : `${first}\n14.1,${cells}\n`;
    const error = refusalOf(text, { columns: `frequency:MHz,${what}` });
    expect(error).toMatchObject({ code, line: what === 'reflection_db' ? 1 : 2 });
    expect(error.remedy).not.toBe('');
  });

  it('an SWR printed a little below one is one', () => {
    const read = readText('14,0.998\n', { columns: 'frequency:MHz,swr,reference=50' });
    expect(scalarOf(read).reflectionMagnitude[0]).toBe(0);
    expect(assumedIn(read)).toEqual(['swr_raised_to_one']);
  });
});

// T. S. Bird, "Definition and misuse of return loss", IEEE Antennas and Propagation Magazine 51(2),
// 2009: positive for a passive load.
describe('the sign of a return loss', () => {
  const columns = 'frequency:MHz,return_loss,reference=50';

  it('is turned, and told, where it is negative throughout', () => {
    const read = readText('14,-20\n14.1,-10\n14.2,0.1\n', { columns });
    expect(scalarOf(read).reflectionMagnitude[0]).toBeCloseTo(0.1, 12);
    expect(assumedIn(read)).toEqual(['return_loss_sign_turned', 'reflection_above_one']);
  });

  it('is left where it is positive but for noise', () => {
    const read = readText('14,20\n14.1,-0.1\n', { columns });
    expect(scalarOf(read).reflectionMagnitude[0]).toBeCloseTo(0.1, 12);
    expect(assumedIn(read)).toEqual(['reflection_above_one']);
  });

  it('is refused where it is both', () => {
    const error = refusalOf('14,20\n14.1,-10\n', { columns });
    expect(error).toMatchObject({ code: 'return_loss_sign', line: 2 });
  });

  it('is no matter for a perfect match', () => {
    const read = readText('14,inf\n14.1,10\n', { columns });
    expect(scalarOf(read).reflectionMagnitude[0]).toBe(0);
    const level = readText('14,-inf\n14.1,-10\n', {
      columns: 'frequency:MHz,reflection_db,reference=50',
    });
    expect(scalarOf(level).reflectionMagnitude[0]).toBe(0);
  });
});
