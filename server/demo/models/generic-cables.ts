import type { FeedLineSection } from '../../../core/line/feed-line.ts';
import type { FeedLine } from './lumped.ts';

/** Kinds of cable by what they are made of; no maker's product. Matched loss per metre at 1 MHz. */
const genericCables = {
  'coax-50-pe-5mm': { characteristicOhm: 50, velocityFactor: 0.66, lossDbPerM: 0.0141 },
  'coax-50-pe-10mm': { characteristicOhm: 50, velocityFactor: 0.66, lossDbPerM: 0.0062 },
  'coax-50-foam-10mm': { characteristicOhm: 50, velocityFactor: 0.85, lossDbPerM: 0.0039 },
} as const;

export type GenericCable = keyof typeof genericCables;

/** A length of generic cable for the models. `lossFactor` above 1 is a cable past its best. */
export function genericLine(cable: GenericCable, lengthM: number, lossFactor = 1): FeedLine {
  const { characteristicOhm, velocityFactor, lossDbPerM } = genericCables[cable];
  const lossDbAt1Mhz = lossDbPerM * lengthM * lossFactor;
  return { characteristicOhm, velocityFactor, lengthM, lossDbAt1Mhz };
}

/** The same length as the record states it. */
export function statedLine(cable: GenericCable, lengthM: number): FeedLineSection {
  return { cable, lengthM, lengthU95M: 0.1, extraLossDb: 0, choke: false };
}
