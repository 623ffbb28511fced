import { type Complex, divide } from '../models/lumped.ts';
import { textBytes, type WriteSweepFile } from './sweep-file.ts';

/** Semicolons and decimal commas: frequency, series resistance and signed reactance. */
export const resistanceReactanceText: WriteSweepFile = ({
  frequencyHz,
  reflection,
  referenceOhm,
}) => ({
  extension: '.csv',
  columns: 'frequency:MHz,resistance,reactance,reference=50',
  bytes: textBytes([
    'Frequency (MHz);R (ohm);X (ohm)',
    ...frequencyHz.map((hz, i) => {
      const { re, im } = impedanceOf(reflection[i], referenceOhm);
      return semicolons([(hz / 1e6).toFixed(6), re.toFixed(2), im.toFixed(2)]);
    }),
  ]),
});

/** The same from older firmware, which did not know the sign of the reactance. */
export const resistanceUnsignedText: WriteSweepFile = ({
  frequencyHz,
  reflection,
  referenceOhm,
}) => ({
  extension: '.csv',
  columns: 'frequency:MHz,resistance,reactance_magnitude,reference=50',
  bytes: textBytes([
    'Frequency (MHz);R (ohm);|X| (ohm)',
    ...frequencyHz.map((hz, i) => {
      const { re, im } = impedanceOf(reflection[i], referenceOhm);
      return semicolons([(hz / 1e6).toFixed(6), re.toFixed(1), Math.abs(im).toFixed(1)]);
    }),
  ]),
});

/** Tabs: frequency in kHz and SWR alone. */
export const swrText: WriteSweepFile = ({ frequencyHz, reflection }) => ({
  extension: '.txt',
  columns: 'frequency:kHz,swr,reference=50',
  bytes: textBytes([
    'kHz\tSWR',
    ...frequencyHz.map((hz, i) => `${(hz / 1e3).toFixed(3)}\t${swrOf(reflection[i]).toFixed(3)}`),
  ]),
});

function semicolons(cells: readonly string[]): string {
  return cells.map((cell) => cell.replace('.', ',')).join(';');
}

function impedanceOf({ re, im }: Complex, referenceOhm: number): Complex {
  const ratio = divide({ re: 1 + re, im }, { re: 1 - re, im: -im });
  return { re: referenceOhm * ratio.re, im: referenceOhm * ratio.im };
}

function swrOf({ re, im }: Complex): number {
  const magnitude = Math.hypot(re, im);
  return (1 + magnitude) / (1 - magnitude);
}
