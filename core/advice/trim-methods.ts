import type { Caution } from '../analysis/summary.ts';
import type { Assumption } from '../formats/read-types.ts';
import { LIGHT_M_PER_S } from '../line/propagation.ts';
import { type AntennaKind, trimBehaviour } from './antenna-kind.ts';
import type { TrimSensitivity } from './trim-history.ts';
import type { TrimAdvice, TrimRequest } from './trim-request.ts';

/** The simple rule is good to about 5 % of the change, and for changes of up to 5 %. */
export const RULE_LIMIT = 0.05;
/** A trial is this part of what the simple rule would say, and at most 1 % of the length. */
const TRIAL_SHARE = 0.25;
const TRIAL_LIMIT = 0.01;
/** A history says little of changes this many times larger than it tried. */
const HISTORY_REACH = 3;
/** A wire's resonant length over that in free space: handbook 468/f ft (value from memory). */
const HALF_WAVE_SHORTENING = 0.9516;

/** The change by the antenna's own sensitivity. */
export function byHistory(request: TrimRequest, sensitivity: TrimSensitivity): TrimAdvice {
  const changeHz = request.targetHz - request.fromHz;
  const lengthChangeM = changeHz / sensitivity.hzPerM;
  const share = sensitivity.u95HzPerM === null ? null : sensitivity.u95HzPerM / sensitivity.hzPerM;
  const own =
    request.fromU95Hz === null || share === null
      ? null
      : Math.hypot(request.fromU95Hz / sensitivity.hzPerM, lengthChangeM * share);
  const beyond = Math.abs(lengthChangeM) > HISTORY_REACH * sensitivity.largestChangeM;
  const reach: readonly Caution[] = beyond
    ? [
        {
          code: 'beyond_history',
          detail: `Earlier work changed the length by ${centimetres(sensitivity.largestChangeM)} at most. Go a part of the way, sweep again and ask again.`,
        },
      ]
    : [];
  const khzPerCm = sensitivity.hzPerM / 1e5;
  return {
    ...common(request),
    method: 'own_sensitivity',
    lengthChangeM,
    lengthChangeU95M: own,
    lengthChangeFraction: request.lengthM === null ? null : lengthChangeM / request.lengthM,
    trialChangeM: null,
    sensitivity,
    detail: `${verb(request)} it by ${centimetres(Math.abs(lengthChangeM))}: this antenna moved by ${khzPerCm.toPrecision(3)} kHz per cm in ${sensitivity.pairs} earlier change(s).`,
    assumptions: [],
    cautions: [...reach, ...always],
  };
}

/** The change by dL = L (f/f_target - 1), with its limits. */
export function bySimpleRule(
  request: TrimRequest,
  sensitivity: TrimSensitivity | null,
  cautions: readonly Caution[],
): TrimAdvice {
  const fraction = request.fromHz / request.targetHz - 1;
  const estimated = request.lengthM ?? estimatedLengthM(request.kind, request.fromHz);
  const assumptions: readonly Assumption[] =
    request.lengthM === null && estimated !== null
      ? [
          {
            code: 'length_estimated',
            detail: `No length is recorded; ${estimated.toFixed(2)} m is taken, the usual one for this kind and frequency.`,
          },
        ]
      : [];
  const lengthChangeM = estimated === null ? null : estimated * fraction;
  const own = request.fromU95Hz === null ? null : request.fromU95Hz / request.targetHz;
  const amount =
    lengthChangeM === null
      ? `${(100 * Math.abs(fraction)).toFixed(2)} % of its length`
      : centimetres(Math.abs(lengthChangeM));
  return {
    ...common(request),
    method: 'simple_rule',
    lengthChangeM,
    lengthChangeU95M:
      estimated === null || own === null
        ? null
        : estimated * Math.hypot(fraction * RULE_LIMIT, own),
    lengthChangeFraction: fraction,
    trialChangeM: null,
    sensitivity,
    detail: `${verb(request)} the whole conductor by ${amount}. The rule that frequency goes with 1/length holds for a bare resonant wire or tube, to about 5 % of the change; ground, insulation and sag add to it.`,
    assumptions,
    cautions: [...cautions, ...always],
  };
}

/** No figure, but a small change to try. */
export function byTrial(
  request: TrimRequest,
  sensitivity: TrimSensitivity | null,
  cautions: readonly Caution[],
): TrimAdvice {
  const { kind, lengthM } = request;
  const behaviour = trimBehaviour(kind);
  const fraction = request.fromHz / request.targetHz - 1;
  const size = Math.min(TRIAL_SHARE * Math.abs(fraction), TRIAL_LIMIT);
  const trial =
    lengthM === null || behaviour === 'not_by_length' ? null : Math.sign(fraction) * size * lengthM;
  const amount =
    trial === null ? `${(100 * size).toFixed(2)} % of its length` : centimetres(Math.abs(trial));
  const tryIt = `${verb(request)} it by ${amount}, sweep again, record both, and ask again: its own sensitivity is then known.`;
  const reason = {
    bare: `The target is more than 5 % away, too far for the simple rule. ${tryIt}`,
    own_way: `Loading, traps, top hats and coupled elements do not follow the simple rule. ${tryIt}${kind === 'trap_dipole' ? ' Begin with the highest band, whose wires are innermost.' : ''}`,
    not_by_length:
      'A small loop is tuned by its capacitor, not by its length; the voltage across it is deadly while anyone transmits.',
  }[behaviour];
  return {
    ...common(request),
    method: 'trial',
    lengthChangeM: null,
    lengthChangeU95M: null,
    lengthChangeFraction: null,
    trialChangeM: trial,
    sensitivity,
    detail: reason,
    assumptions: [],
    cautions: [...cautions, ...always],
  };
}

/** Nothing to be done. */
export function leave(request: TrimRequest): TrimAdvice {
  return {
    ...common(request),
    method: 'leave',
    direction: 'leave',
    lengthChangeM: 0,
    lengthChangeU95M: null,
    lengthChangeFraction: 0,
    trialChangeM: null,
    sensitivity: null,
    detail: 'It stands at the target within the half-width of the measurement: leave it.',
    assumptions: [],
    cautions: [],
  };
}

function common(request: TrimRequest) {
  const direction = request.targetHz > request.fromHz ? 'shorten' : 'lengthen';
  return {
    goal: request.goal,
    direction,
    frequencyChangeHz: request.targetHz - request.fromHz,
  } as const;
}

const always: readonly Caution[] = [
  {
    code: 'trim_in_steps',
    detail:
      'Fold wire back before cutting it, change both sides of a dipole alike, and sweep after every step.',
  },
  {
    code: 'trim_transmitter_off',
    detail:
      'Disconnect the transmitter before anyone touches the antenna, and mind power lines, height and weather by local rules.',
  },
];

/** Usual length of a bare antenna at its lowest resonance; null where the harmonic is not known. */
function estimatedLengthM(kind: AntennaKind, hz: number): number | null {
  const halfWaveM = (HALF_WAVE_SHORTENING * LIGHT_M_PER_S) / (2 * hz);
  if (kind === 'dipole') return halfWaveM;
  return kind === 'vertical_with_radials' ? halfWaveM / 2 : null;
}

function verb(request: TrimRequest): string {
  return request.targetHz > request.fromHz ? 'Shorten' : 'Lengthen';
}

function centimetres(metres: number): string {
  return `${(100 * metres).toPrecision(3)} cm`;
}
