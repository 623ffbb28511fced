import type { Caution } from '../analysis/summary.ts';
import { fail, ok, type Result } from '../result.ts';
import { trimBehaviour } from './antenna-kind.ts';
import { type TrimSensitivity, trimSensitivity } from './trim-history.ts';
import { byHistory, bySimpleRule, byTrial, leave, RULE_LIMIT } from './trim-methods.ts';
import type { TrimAdvice, TrimRequest } from './trim-request.ts';

export type TrimErrorCode = 'frequency_not_positive' | 'length_not_positive';

export interface TrimError {
  readonly code: TrimErrorCode;
  readonly detail: string;
}

/**
 * The change of length that moves an antenna to a target frequency: by its own measured sensitivity
 * where earlier work shows one, by dL = L (f/f_target - 1) for a bare resonant wire or tube (exact
 * only if every dimension scales), and else none but a small trial.
 */
export function trimAdvice(request: TrimRequest): Result<TrimAdvice, TrimError> {
  const { fromHz, targetHz, lengthM } = request;
  if (!(fromHz > 0 && targetHz > 0 && Number.isFinite(fromHz / targetHz))) {
    return fail({
      code: 'frequency_not_positive',
      detail: 'Both frequencies are positive numbers of hertz.',
    });
  }
  if (lengthM !== null && !(lengthM > 0 && Number.isFinite(lengthM))) {
    return fail({
      code: 'length_not_positive',
      detail: 'A length is a positive number of metres.',
    });
  }
  const advice = chosen(request);
  return ok(
    request.throughLine && request.goal === 'resonance'
      ? { ...advice, cautions: [seenThroughLine, ...advice.cautions] }
      : advice,
  );
}

function chosen(request: TrimRequest): TrimAdvice {
  const { fromHz, fromU95Hz, targetHz, kind } = request;
  const changeHz = targetHz - fromHz;
  if (Math.abs(changeHz) <= (fromU95Hz ?? 0)) return leave(request);
  const sensitivity = trimSensitivity(request.history);
  if (sensitivity !== null && isTelling(sensitivity)) return byHistory(request, sensitivity);
  const cautions = sensitivity === null ? [] : [untelling(sensitivity)];
  const behaviour = trimBehaviour(kind);
  const withinRule = Math.abs(targetHz / fromHz - 1) <= RULE_LIMIT;
  if (behaviour === 'bare' && withinRule) return bySimpleRule(request, sensitivity, cautions);
  return byTrial(request, sensitivity, cautions);
}

const seenThroughLine: Caution = {
  code: 'resonance_seen_through_line',
  detail:
    "This resonance was seen through a line and is not the antenna's own. Trim by the feed point, or by the least SWR.",
};

/** A sensitivity counts where longer means lower, beyond its half-width. */
function isTelling({ hzPerM, u95HzPerM }: TrimSensitivity): boolean {
  return hzPerM < 0 && Math.abs(hzPerM) > (u95HzPerM ?? 0);
}

function untelling({ hzPerM }: TrimSensitivity): Caution {
  return hzPerM >= 0
    ? {
        code: 'history_contradicts',
        detail:
          'In its history longer went with higher frequency, which length alone does not do: something else changed, or the entries are mixed up. It is not used.',
      }
    : {
        code: 'history_too_vague',
        detail: 'Its history scatters too much to give a sensitivity. It is not used.',
      };
}
