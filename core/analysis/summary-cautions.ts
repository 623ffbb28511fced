import type { Analysis } from './analysis.ts';
import { type InstrumentError, reflectionErrorBound } from './instrument-error.ts';
import type { Caution } from './summary.ts';

/** What must be known of the half-widths and the reference to read the summary rightly. */
export function summaryCautions(
  { sweep, instrument }: Analysis,
  askedReferenceOhm: number,
): readonly Caution[] {
  const cautions: Caution[] = [instrument === null ? noiseOnly : withInstrument(instrument)];
  if (sweep.referenceOhm !== askedReferenceOhm) {
    cautions.push({
      code: 'reference_not_moved',
      detail: `A sweep without phase cannot be referred to another resistance: the SWR holds for ${sweep.referenceOhm} ohm, not for ${askedReferenceOhm} ohm.`,
    });
  }
  return cautions;
}

const noiseOnly: Caution = {
  code: 'noise_only',
  detail:
    'The half-widths hold the noise of this sweep only. What the analyzer itself is off by is not known: state its residual errors, or check it with a known load.',
};

function withInstrument(instrument: InstrumentError): Caution {
  const named = [
    instrument.directivity === null ? 'directivity' : '',
    instrument.sourceMatch === null ? 'source match' : '',
    instrument.tracking === null ? 'tracking' : '',
  ].filter((name) => name !== '');
  const bound = reflectionErrorBound(instrument, 1).toPrecision(2);
  const missing = named.length === 0 ? '' : ` Not known, and so not counted: ${named.join(', ')}.`;
  return {
    code: 'instrument_error_included',
    detail: `The half-widths hold the noise and the residual errors of the analyzer at their worst phase (up to ${bound} of a full reflection).${missing}`,
  };
}
