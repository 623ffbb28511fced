import { trimAdvice } from '../../core/advice/trim.ts';
import type { TrimAdvice } from '../../core/advice/trim-request.ts';
import type { Absence, Resonance, Summary } from '../../core/analysis/summary.ts';
import { fail, type Result } from '../../core/result.ts';
import type { AdviceRequest, AdvisedAntenna } from './advice-request.ts';

type Reason = Pick<Absence, 'code' | 'detail'>;

/** The trim that moves the antenna to a frequency, from what the summary shows nearest to it. */
export function trimStep(
  summary: Summary,
  { kind, workPairs }: AdvisedAntenna,
  request: AdviceRequest,
  targetHz: number | null,
  throughLine: boolean,
): Result<TrimAdvice, Reason> {
  if (targetHz === null) {
    return fail({
      code: 'no_target',
      detail: 'The sweep reaches no band: say to which frequency the antenna is to be moved.',
    });
  }
  // Through a line, or without the sign of the reactance, a resonance is not the antenna's.
  const usual = summary.phase === 'signed' && !throughLine ? 'resonance' : 'swr_minimum';
  const goal = request.goal ?? usual;
  const from =
    goal === 'resonance' ? nearestResonance(summary, targetHz) : nearestMinimum(summary, targetHz);
  if (from === null) {
    return fail({
      code: goal === 'resonance' ? 'no_resonance' : 'no_minimum',
      detail: `The sweep shows no ${goal === 'resonance' ? 'resonance' : 'minimum of SWR inside its ends'} that could be moved.`,
    });
  }
  const { frequencyHz: fromHz, frequencyU95Hz: fromU95Hz } = from;
  const { lengthM } = request;
  return trimAdvice({
    kind,
    goal,
    fromHz,
    fromU95Hz,
    targetHz,
    lengthM,
    throughLine,
    history: workPairs,
  });
}

/** A series resonance where there is one: a parallel one is rarely that of the antenna itself. */
export function nearestResonance({ resonances }: Summary, targetHz: number): Resonance | null {
  const beyondDoubt = resonances.filter(({ grazing }) => !grazing);
  const series = beyondDoubt.filter(({ kind }) => kind === 'series');
  return nearest(series.length > 0 ? series : beyondDoubt, targetHz);
}

function nearestMinimum({ swrMinima }: Summary, targetHz: number) {
  return nearest(
    swrMinima.filter(({ atEdge }) => !atEdge),
    targetHz,
  );
}

function nearest<Place extends { readonly frequencyHz: number }>(
  places: readonly Place[],
  targetHz: number,
): Place | null {
  return places.reduce<Place | null>(
    (best, place) =>
      best === null ||
      Math.abs(place.frequencyHz - targetHz) < Math.abs(best.frequencyHz - targetHz)
        ? place
        : best,
    null,
  );
}
