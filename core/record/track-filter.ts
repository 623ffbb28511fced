/**
 * Where a resonance is expected: the logarithm of its frequency and its rate a year, with their
 * covariance. A constant-velocity Kalman filter (Kalman, J. Basic Engineering 82, 1960).
 */
export interface TrackState {
  readonly atMs: number;
  readonly logHz: number;
  readonly ratePerYear: number;
  readonly varLog: number;
  readonly covariance: number;
  readonly varRate: number;
}

/** What is expected of antennas and instruments, as parts of the frequency (our choices). */
export interface TrackModel {
  /** Standard deviation from one sweep to the next: wind, sag, heat, and what instruments differ by. */
  readonly scatter: number;
  /** Standard deviation of the drift a year. */
  readonly ratePerYear: number;
  /** Standard deviation of the change of that rate within a year. */
  readonly rateChange: number;
  /** Standard deviation of what work on the antenna does. */
  readonly workShift: number;
}

export const usualTrackModel: TrackModel = {
  scatter: 0.0012,
  ratePerYear: 0.01,
  rateChange: 0.004,
  workShift: 0.03,
};

const yearMs = 365.25 * 24 * 3600 * 1000;

/** The state of a resonance that was seen once; `varLog` is the variance of that. */
export function firstState(
  atMs: number,
  logHz: number,
  varLog: number,
  { ratePerYear }: TrackModel,
): TrackState {
  return { atMs, logHz, ratePerYear: 0, varLog, covariance: 0, varRate: ratePerYear ** 2 };
}

/** The state at a later time. */
export function predicted(state: TrackState, atMs: number, { rateChange }: TrackModel): TrackState {
  const years = Math.max(0, (atMs - state.atMs) / yearMs);
  const noise = rateChange ** 2;
  return {
    atMs,
    logHz: state.logHz + state.ratePerYear * years,
    ratePerYear: state.ratePerYear,
    varLog:
      state.varLog +
      2 * years * state.covariance +
      years ** 2 * state.varRate +
      (noise * years ** 3) / 3,
    covariance: state.covariance + years * state.varRate + (noise * years ** 2) / 2,
    varRate: state.varRate + noise * years,
  };
}

/** The state after a resonance was seen; `varSeen` is the variance of its logarithm. */
export function updated(state: TrackState, logHz: number, varSeen: number): TrackState {
  const total = state.varLog + varSeen;
  const gain = state.varLog / total;
  const gainRate = state.covariance / total;
  const miss = logHz - state.logHz;
  return {
    atMs: state.atMs,
    logHz: state.logHz + gain * miss,
    ratePerYear: state.ratePerYear + gainRate * miss,
    varLog: (1 - gain) * state.varLog,
    covariance: (1 - gain) * state.covariance,
    varRate: state.varRate - gainRate * state.covariance,
  };
}

/** The state once work was done: it may lie elsewhere now, and drift otherwise. */
export function afterWork(state: TrackState, { workShift, ratePerYear }: TrackModel): TrackState {
  return {
    ...state,
    ratePerYear: 0,
    varLog: state.varLog + workShift ** 2,
    covariance: 0,
    varRate: ratePerYear ** 2,
  };
}
