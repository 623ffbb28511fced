import type { AntennaBook } from './antenna-book.ts';
import type { Instrument } from './instruments.ts';
import { type Complex, inSeries, multiply, reflectionOf } from './models/lumped.ts';
import { seededStream } from './random.ts';
import { occasionOf, type SweepRange, type Visit } from './visit.ts';

/** What an instrument shows: reflection against 50 ohm at whole hertz. */
export interface Measurement {
  readonly frequencyHz: readonly number[];
  readonly reflection: readonly Complex[];
  readonly referenceOhm: number;
}

/** Wind, sag and temperature move every antenna a little from one visit to the next. */
const sceneScatter = 2e-4;
const referenceOhm = 50;

/**
 * Measures an antenna as the instrument would: the model at the true frequency, then directivity,
 * tracking and noise. The same visit always gives the same numbers.
 */
export function measure(book: AntennaBook, visit: Visit, instrument: Instrument): Measurement {
  const stream = seededStream(`${book.antenna.key} ${visit.measuredAt} ${visit.by}`);
  const occasion = occasionOf(visit);
  const scene = 1 + sceneScatter * stream.gaussian();
  const frequencyHz = grid(book.range, instrument.points(book.range));
  const { directivity, tracking, noise, frequencyScale } = instrument.errors;
  const reflection = frequencyHz.map((shownHz) => {
    const trueHz = shownHz / frequencyScale;
    const truth = reflectionOf(book.model(trueHz * scene, occasion), referenceOhm);
    const scatter = { re: noise * stream.gaussian(), im: noise * stream.gaussian() };
    return inSeries(inSeries(directivity, multiply(tracking, truth)), scatter);
  });
  return { frequencyHz, reflection, referenceOhm };
}

function grid({ lowHz, highHz }: SweepRange, points: number): readonly number[] {
  const stepHz = (highHz - lowHz) / (points - 1);
  return Array.from({ length: points }, (_, i) => Math.round(lowHz + i * stepHz));
}
