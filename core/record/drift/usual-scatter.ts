import type { DriftMeasure } from './drift-series.ts';

/**
 * What is expected of a sound antenna before anything is measured, as standard deviations of the
 * logarithm of the measure, and the least change worth a word. Common practice, no source; the
 * false alarms and misses that follow from them are measured by the accuracy bench.
 */
export interface UsualScatter {
  /** From one sweep to the next. */
  readonly sweep: number;
  /** Of an instrument from the mean of all. */
  readonly instrument: number;
  /** Amplitude of the year's course. */
  readonly season: number;
  /** Of a wet antenna from a dry one. */
  readonly wet: number;
  /** A smaller change is not reported. */
  readonly worthReporting: number;
  /** An instrument farther off than this is reported. */
  readonly instrumentLimit: number;
}

export const usualScatter: Readonly<Record<DriftMeasure, UsualScatter>> = {
  resonance_hz: {
    sweep: 0.0008,
    instrument: 0.0015,
    season: 0.001,
    wet: 0.0015,
    worthReporting: 0.003,
    instrumentLimit: 0.0015,
  },
  minimum_swr_hz: {
    sweep: 0.0015,
    instrument: 0.0015,
    season: 0.001,
    wet: 0.002,
    worthReporting: 0.005,
    instrumentLimit: 0.0015,
  },
  minimum_swr: {
    sweep: 0.02,
    instrument: 0.03,
    season: 0.02,
    wet: 0.03,
    worthReporting: 0.08,
    instrumentLimit: 0.08,
  },
  span_width_hz: {
    sweep: 0.02,
    instrument: 0.03,
    season: 0.02,
    wet: 0.03,
    worthReporting: 0.08,
    instrumentLimit: 0.1,
  },
  resistance_ohm: {
    sweep: 0.02,
    instrument: 0.03,
    season: 0.03,
    wet: 0.04,
    worthReporting: 0.12,
    instrumentLimit: 0.1,
  },
};
