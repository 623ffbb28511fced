import type { Complex } from '../models/lumped.ts';
import { textBytes, type WriteSweepFile } from './sweep-file.ts';

type Unit = 'HZ' | 'KHZ' | 'MHZ';
type Pair = 'RI' | 'MA' | 'DB';

const unitDigits: Readonly<Record<Unit, number>> = { HZ: 0, KHZ: 3, MHZ: 6 };

/** A one-port file of version 1. */
export function touchstone1(unit: Unit, pair: Pair): WriteSweepFile {
  return ({ frequencyHz, reflection, referenceOhm }, title) => ({
    extension: '.s1p',
    bytes: textBytes([
      `! ${title}`,
      `# ${unit} S ${pair} R ${referenceOhm}`,
      ...frequencyHz.map((hz, i) => `${inUnit(hz, unit)} ${asPair(reflection[i], pair)}`),
    ]),
  });
}

/** A one-port file of version 2.0. */
export function touchstone2(unit: Unit, pair: Pair): WriteSweepFile {
  return ({ frequencyHz, reflection, referenceOhm }, title) => ({
    extension: '.ts',
    bytes: textBytes([
      `! ${title}`,
      '[Version] 2.0',
      `# ${unit} S ${pair} R ${referenceOhm}`,
      '[Number of Ports] 1',
      `[Number of Frequencies] ${frequencyHz.length}`,
      `[Reference] ${referenceOhm}`,
      '[Network Data]',
      ...frequencyHz.map((hz, i) => `${inUnit(hz, unit)} ${asPair(reflection[i], pair)}`),
      '[End]',
    ]),
  });
}

/** A two-port file of version 1: the antenna at port 1, a load at port 2, little between them. */
export function touchstone1TwoPort(unit: Unit, pair: Pair): WriteSweepFile {
  const between = asPair({ re: 0.0002, im: -0.0001 }, pair);
  const load = asPair({ re: 0.01, im: 0.003 }, pair);
  return ({ frequencyHz, reflection, referenceOhm }, title) => ({
    extension: '.s2p',
    port: 1,
    bytes: textBytes([
      `! ${title}`,
      '! Port 1: the antenna. Port 2: a load.',
      `# ${unit} S ${pair} R ${referenceOhm}`,
      ...frequencyHz.map(
        (hz, i) =>
          `${inUnit(hz, unit)} ${asPair(reflection[i], pair)} ${between} ${between} ${load}`,
      ),
    ]),
  });
}

function inUnit(frequencyHz: number, unit: Unit): string {
  const digits = unitDigits[unit];
  return (frequencyHz / 10 ** digits).toFixed(digits);
}

function asPair({ re, im }: Complex, pair: Pair): string {
  if (pair === 'RI') return `${re.toFixed(6)} ${im.toFixed(6)}`;
  const magnitude = Math.hypot(re, im);
  const degrees = ((Math.atan2(im, re) * 180) / Math.PI).toFixed(4);
  if (pair === 'MA') return `${magnitude.toFixed(6)} ${degrees}`;
  return `${(20 * Math.log10(magnitude)).toFixed(5)} ${degrees}`;
}
