/**
 * What is left of an analyzer's errors after its calibration, as linear magnitudes: a perfect match
 * reads `directivity`, a reflection is off by `tracking` of itself and by `sourceMatch` of its square.
 * Null: not known, and so not counted.
 */
export interface InstrumentError {
  readonly directivity: number | null;
  readonly sourceMatch: number | null;
  readonly tracking: number | null;
}

/** The same figures as instruments state them, dB: the first two below full reflection. */
export interface StatedInstrumentError {
  readonly directivityDb: number | null;
  readonly sourceMatchDb: number | null;
  /** Greatest error of a full reflection, dB. */
  readonly trackingDb: number | null;
}

/** Linear magnitudes of figures stated in dB. */
export function instrumentErrorOf(stated: StatedInstrumentError): InstrumentError {
  const below = (db: number | null) => (db === null ? null : 10 ** (-Math.abs(db) / 20));
  const { directivityDb, sourceMatchDb, trackingDb } = stated;
  return {
    directivity: below(directivityDb),
    sourceMatch: below(sourceMatchDb),
    tracking: trackingDb === null ? null : 10 ** (Math.abs(trackingDb) / 20) - 1,
  };
}

/** The same as stated figures, dB; an error of zero has no such figure and comes back as null. */
export function statedInstrumentError(error: InstrumentError): StatedInstrumentError {
  const below = (linear: number | null) =>
    linear === null || linear === 0 ? null : -20 * Math.log10(linear);
  const { directivity, sourceMatch, tracking } = error;
  return {
    directivityDb: below(directivity),
    sourceMatchDb: below(sourceMatch),
    trackingDb: tracking === null ? null : 20 * Math.log10(1 + tracking),
  };
}

/**
 * Greatest error of a reflection of this magnitude, whatever the phases: D + T ρ + M ρ² (the one-port
 * error model as in EURAMET cg-12, Guidelines on the Evaluation of Vector Network Analysers).
 */
export function reflectionErrorBound(error: InstrumentError, magnitude: number): number {
  const { directivity, sourceMatch, tracking } = error;
  return (
    (directivity ?? 0) + (tracking ?? 0) * magnitude + (sourceMatch ?? 0) * magnitude * magnitude
  );
}
