import { describe, expect, it } from 'vitest';
import {
  impedanceOf,
  pointsOf,
  refused,
  swrOf,
  taken,
} from '../core/formats/touchstone/reading.ts';

// Inputs: numbers of the examples in the Touchstone File Format Specification (IBIS Open Forum), Rev
// 1.1 (2002), Version 2.0 (2009) and Version 2.1 (2024), retyped. Derived values: recomputed in
// double precision, those for S and Z also by a general-purpose network library.

describe('one-port S in magnitude and angle (Rev 1.1 example 1)', () => {
  const { sweep } = taken('# MHz S MA R 50\n2.000 0.894 -12.136\n');

  it('has the reflection, impedance and SWR that follow from it', () => {
    const [[f, re, im]] = pointsOf(sweep);
    expect(f).toBe(2_000_000);
    expect(re).toBeCloseTo(0.874020295, 9);
    expect(im).toBeCloseTo(-0.187948195, 9);
    expect(impedanceOf(sweep)[0]).toBeCloseTo(196.076171, 5);
    expect(impedanceOf(sweep)[1]).toBeCloseTo(-367.119229, 5);
    expect(swrOf(sweep)).toBeCloseTo(17.867925, 5);
  });
});

const zRows: readonly (readonly number[])[] = [
  // MHz, magnitude, degrees, R ohm, X ohm, S11 re and im at 75 ohm, SWR at 75 ohm
  [100, 0.99, -4, 74.069131, -5.179418, -0.005031253, -0.034919887, 1.073141],
  [200, 0.8, -22, 55.631031, -22.476396, -0.115255538, -0.191891042, 1.576801],
  [300, 0.707, -45, 37.494337, -37.494337, -0.200084571, -0.399987916, 2.618211],
  [400, 0.4, -62, 14.084147, -26.488428, -0.547025557, -0.459995141, 6.01079],
  [500, 0.01, -89, 0.013089, -0.749886, -0.999451198, -0.019987978, 5730.441662],
];

describe('one-port Z normalised to 75 ohm (Rev 1.1 example 2)', () => {
  const rows = zRows.map(([f, magnitude, angle]) => `${f} ${magnitude} ${angle}`);
  const { sweep } = taken(`# MHz Z MA R 75\n${rows.join('\n')}\n`);

  it.each(zRows.map((row, i) => [row[0], i] as const))('is right at %d MHz', (_, i) => {
    const [, , , r, x, re, im, swr] = zRows[i];
    expect(sweep.referenceOhm).toBe(75);
    expect(impedanceOf(sweep, i)[0]).toBeCloseTo(r, 5);
    expect(impedanceOf(sweep, i)[1]).toBeCloseTo(x, 5);
    expect(sweep.reflectionRe[i]).toBeCloseTo(re, 8);
    expect(sweep.reflectionIm[i]).toBeCloseTo(im, 8);
    expect(Math.abs(swrOf(sweep, i) / swr - 1)).toBeLessThan(1e-6);
  });
});

describe('the same Z in ohms in version 2 (2.0 examples 7 and 10)', () => {
  const rows = zRows.map(([f, magnitude, angle]) => `${f} ${magnitude * 75} ${angle}`);
  const header = `# MHz Z MA\n[Number of Ports] 1\n[Number of Frequencies] 5\n[Reference] 20.0\n`;
  const text = `[Version] 2.0\n${header}[Network Data]\n${rows.join('\n')}\n`;

  it('is the same impedance, whatever the reference', () => {
    const { sweep } = taken(`${text}[End]\n`);
    expect(sweep.referenceOhm).toBe(20);
    for (const [i, row] of zRows.entries()) {
      expect(impedanceOf(sweep, i)[0]).toBeCloseTo(row[3], 4);
      expect(impedanceOf(sweep, i)[1]).toBeCloseTo(row[4], 4);
    }
    expect(sweep.reflectionRe[0]).toBeCloseTo(0.576065991, 9);
    expect(sweep.reflectionIm[0]).toBeCloseTo(-0.02334168, 9);
  });

  it('is taken as printed, without [End], and says so', () => {
    expect(taken(text).codes).toEqual(['end_missing']);
  });
});

describe('two-port H (Rev 1.1 example 3)', () => {
  const row = '2 .95 -26 3.57 157 .04 76 .66 -14';

  it.each([
    ['version 1', `# kHz H MA R 1\n${row}\n`],
    [
      'version 2',
      `[Version] 2.0\n# kHz H MA R 1\n[Number of Ports] 2\n[Two-Port Data Order] 21_12\n[Number of Frequencies] 1\n[Network Data]\n${row}\n[End]\n`,
    ],
  ])('gives the reflections at both ports in %s', (_, text) => {
    const [[f, re1, im1]] = pointsOf(taken(text, { port: 1 }).sweep);
    const [[, re2, im2]] = pointsOf(taken(text, { port: 2 }).sweep);
    expect(f).toBe(2000);
    expect([re1, im1, re2, im2].map((x) => Number(x.toFixed(6)))).toEqual([
      -0.019976, -0.183973, 0.193072, 0.065096,
    ]);
  });
});

describe('two-port S in real and imaginary part (Rev 1.1 example 4)', () => {
  const { sweep, codes } = taken(
    `# GHz S RI R 50.0
1.0000 0.3926 -0.1211 -0.0003 -0.0021 -0.0003 -0.0021 0.3926 -0.1211
2.0000 0.3517 -0.3054 -0.0096 -0.0298 -0.0096 -0.0298 0.3517 -0.3054
10.000 0.3419 0.3336 -0.0134 0.0379 -0.0134 0.0379 0.3419 0.3336
`,
    { port: 1 },
  );

  it.each([
    [0, 108.342035, -31.569346, 2.394737],
    [1, 76.235963, -59.467011, 2.743859],
    [2, 70.888805, 61.280209, 2.829119],
  ])('has the impedance of its point %d', (i, r, x, swr) => {
    expect(impedanceOf(sweep, i)[0]).toBeCloseTo(r, 5);
    expect(impedanceOf(sweep, i)[1]).toBeCloseTo(x, 5);
    expect(swrOf(sweep, i)).toBeCloseTo(swr, 5);
  });

  it('says that the other port was taken as matched', () => {
    expect(codes).toEqual(['other_port_matched']);
  });
});

const network = `2 .95 -26 3.57 157 .04 76 .66 -14
22 .60 -144 1.30 40 .14 40 .56 -85`;

describe('two-port S with noise (Rev 1.1 example 8)', () => {
  const text = `# GHZ S MA R 50\n${network}\n4 .7 .64 69 .38\n18 2.7 .46 -33 .40\n`;

  it('has two points, SWR 39 and 4, and two noise rows passed over', () => {
    const { sweep, codes } = taken(text, { port: 1 });
    expect([...sweep.frequencyHz]).toEqual([2e9, 22e9]);
    expect(swrOf(sweep, 0)).toBeCloseTo(39, 9);
    expect(swrOf(sweep, 1)).toBeCloseTo(4, 9);
    expect(codes).toContain('noise_passed_over');
  });

  it('has S22 at port 2', () => {
    const { sweep } = taken(text, { port: 2 });
    expect(sweep.reflectionRe[1]).toBeCloseTo(0.048807216, 9);
    expect(sweep.reflectionIm[1]).toBeCloseTo(-0.557869031, 9);
  });
});

describe('the same in version 2 with unequal references (2.0 example 17)', () => {
  const text = (order: string) => `[Version] 2.0
#
[Number of Ports] 2
[Two-Port Data Order] ${order}
[Number of Frequencies] 2
[Number of Noise Frequencies] 2
[Reference] 50 25.0
[Network Data]
${network}
[Noise Data]
4 .7 .64 69 19
18 2.7 .46 -33 20
[End]
`;

  it('refers port 2 to its own 25 ohm', () => {
    const { sweep } = taken(text('21_12'), { port: 2 });
    expect(sweep.referenceOhm).toBe(25);
    expect(impedanceOf(sweep)[0]).toBeCloseTo(91.144194, 5);
    expect(impedanceOf(sweep)[1]).toBeCloseTo(-51.569285, 5);
  });

  it('gives the same reflections in either data order (2.1 example 21)', () => {
    expect(pointsOf(taken(text('12_21'), { port: 1 }).sweep)).toEqual(
      pointsOf(taken(text('21_12'), { port: 1 }).sweep),
    );
  });
});

describe('what the documents print wrong', () => {
  it('a version inside the bracket is refused (2.0 example 12)', () => {
    const text = '[Version 2.0]\n# kHz H MA R 1\n[Number of Ports] 2\n';
    expect(refused(text)).toMatchObject({ code: 'version_missing', line: 1 });
  });

  it('a missing data order is told, and the reflection read all the same (2.1 example 20)', () => {
    const text = `[Version] 2.1\n#\n[Number of Ports] 2\n[Number of Frequencies] 2\n[Network Data]\n${network}\n[End]\n`;
    expect(taken(text, { port: 1 }).codes).toContain('order_missing');
  });

  it('a second option line between keywords is passed over (2.0 example 16)', () => {
    const text = `[Version] 2.0\n# MHz S RI\n[Number of Ports] 1\n# MHz S RI\n[Number of Frequencies] 1\n[Network Data]\n1 .1 .2\n[End]\n`;
    expect(taken(text).codes).toEqual([]);
  });

  it('the short name of the data order is taken with a word (2.0, page 5)', () => {
    const text = `[Version] 2.0\n#\n[Number of Ports] 2\n[Two-Port Order] 21_12\n[Number of Frequencies] 2\n[Network Data]\n${network}\n[End]\n`;
    expect(taken(text, { port: 1 }).codes).toContain('order_alias');
  });
});

describe('the option lines of the documents', () => {
  const row = '1 .1 0';
  it.each([
    ['#', 1e9, 50],
    ['# GHz S RI R 100', 1e9, 100],
    ['# S R 100 GHz RI', 1e9, 100],
    ['# Hz Z MA R 10', 1, 10],
    ['# kHz Y RI R 100', 1e3, 100],
  ])('%s', (option, hertz, reference) => {
    const { sweep } = taken(`${option}\n${row}\n`);
    expect(sweep.frequencyHz[0]).toBe(hertz);
    expect(sweep.referenceOhm).toBe(reference);
  });

  it('give one reference for each port (2.1, page 9)', () => {
    const text = '# S GHz RI R 0.1 75.0\n1 .11 0 .21 0 .12 0 .22 0\n';
    expect(taken(text, { port: 1 }).sweep.referenceOhm).toBe(0.1);
    expect(taken(text, { port: 2 }).sweep.referenceOhm).toBe(75);
  });
});

// Synthetic vectors of our own, values in closed form.
describe('vectors in closed form', () => {
  it('SY-1: thirds and halves are 150, 30 + j40 and 25 ohm', () => {
    const { sweep } = taken('# MHz S RI R 50\n1 0.5 0\n2 0 0.5\n3 -0.3333333333 0\n');
    expect(impedanceOf(sweep, 0)).toEqual([150, 0]);
    expect(impedanceOf(sweep, 1)[0]).toBeCloseTo(30, 12);
    expect(impedanceOf(sweep, 1)[1]).toBeCloseTo(40, 12);
    expect(impedanceOf(sweep, 2)[0]).toBeCloseTo(25, 8);
  });

  it('SY-2: -9.54 dB is a third, SWR 2', () => {
    const { sweep } = taken('# MHz S DB R 50\n1 -9.5424250943932 0\n');
    expect(sweep.reflectionRe[0]).toBeCloseTo(1 / 3, 12);
    expect(swrOf(sweep)).toBeCloseTo(2, 12);
  });

  it('SY-3: 21 stands before 12, and 22 last', () => {
    const text = '# GHz S RI R 50\n1 .11 0 .21 0 .12 0 .22 0\n';
    expect(taken(text, { port: 1 }).sweep.reflectionRe[0]).toBe(0.11);
    expect(taken(text, { port: 2 }).sweep.reflectionRe[0]).toBe(0.22);
  });

  it('SY-4: normalised Z of 1 is 50 ohm, normalised Y of 0.5 is 100 ohm', () => {
    expect(impedanceOf(taken('# MHz Z RI R 50\n1 1 0\n').sweep)).toEqual([50, 0]);
    expect(impedanceOf(taken('# MHz Y RI R 50\n1 0.5 0\n').sweep)[0]).toBeCloseTo(100, 12);
  });

  it('SY-5: 73.1 + j42.5 ohm', () => {
    const { sweep } = taken('# MHz Z RI R 1\n14 73.1 42.5\n');
    expect(impedanceOf(sweep)[0]).toBeCloseTo(73.1, 10);
    const { sweep: at50 } = taken(
      '[Version] 2.0\n# MHz Z RI R 50\n[Number of Ports] 1\n[Number of Frequencies] 1\n[Network Data]\n14 73.1 42.5\n[End]\n',
    );
    expect(at50.reflectionRe[0]).toBeCloseTo(0.274168537, 9);
    expect(at50.reflectionIm[0]).toBeCloseTo(0.250591691, 9);
    expect(swrOf(at50)).toBeCloseTo(2.181855, 6);
  });

  it.each([
    ['LF', '# MHz S RI R 50\n1 .5 5.\n2 1E-1 +.25\n'],
    ['CR+LF', '# MHz S RI R 50\r\n1 .5 5.\r\n2 1E-1 +.25\r\n'],
    ['CR', '# MHz S RI R 50\r1 .5 5.\r2 1E-1 +.25\r'],
    ['tabs', '#\tMHz\tS\tRI\tR\t50\n1\t.5\t5.\n\t2\t1E-1\t+.25\n'],
    ['no last line end', '# MHz S RI R 50\n1 .5 5.\n2 1E-1 +.25'],
    [
      'blank lines and comments',
      '! c\n\n# MHz S RI R 50 ! c\n!\n1 .5 5. ! c\n   \n2 1E-1 +.25!c\n',
    ],
  ])('SY-6: the same points with %s', (_, text) => {
    expect(pointsOf(taken(text).sweep)).toEqual([
      [1e6, 0.5, 5],
      [2e6, 0.1, 0.25],
    ]);
  });

  it('SY-7: total reflections are kept', () => {
    const { sweep } = taken('# MHz S RI R 50\n1 1 0\n2 -1 0\n');
    expect([...sweep.reflectionRe]).toEqual([1, -1]);
  });

  it.each(['Lower', 'Upper'])('SY-8: %s matrices hold three pairs', (form) => {
    const text = `[Version] 2.0\n# GHz S RI\n[Number of Ports] 2\n[Two-Port Data Order] 21_12\n[Number of Frequencies] 1\n[Matrix Format] ${form}\n[Network Data]\n1 .11 0 .21 0 .22 0\n[End]\n`;
    expect(taken(text, { port: 2 }).sweep.reflectionRe[0]).toBe(0.22);
  });

  it('SY-9: version 2 points may go over any number of lines', () => {
    const text =
      '[Version] 2.0\n# GHz S RI\n[Number of Ports] 1\n[Number of Frequencies] 2\n[Network Data]\n1\n.11\n0\n2 .2\n.1\n[End]\n';
    expect(pointsOf(taken(text).sweep)).toEqual([
      [1e9, 0.11, 0],
      [2e9, 0.2, 0.1],
    ]);
  });
});
