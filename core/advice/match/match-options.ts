import type { Caution } from '../../analysis/summary.ts';
import type { Assumption } from '../../formats/read-types.ts';
import type { Complex } from '../../line/complex.ts';
import { fail, ok, type Result } from '../../result.ts';
import type { Sweep } from '../../sweep.ts';
import { bandLoads, loadAt } from './band-loads.ts';
import { type BandMatch, bandMatch } from './band-swr.ts';
import { designs } from './designs.ts';
import type { MatchElement } from './element.ts';
import type { MatchKind, MatchRequest } from './match-request.ts';
import { nearestElement } from './standard-values.ts';

/** One way to match, with exact parts and with parts as they can be had; load first. */
export interface MatchOption {
  readonly kind: MatchKind;
  readonly elements: readonly MatchElement[];
  readonly exact: BandMatch;
  readonly nearestElements: readonly MatchElement[];
  readonly nearest: BandMatch;
}

export interface MatchAdvice {
  readonly place: 'feed_point' | 'line_end';
  readonly designHz: number;
  readonly load: Complex;
  /** The frequencies for which every option lists its SWR. */
  readonly frequencyHz: Float64Array;
  /** Without any network. */
  readonly unmatched: BandMatch;
  /** Widest usable span with parts as they can be had first; then least loss, then fewest parts. */
  readonly options: readonly MatchOption[];
  readonly assumptions: readonly Assumption[];
  readonly cautions: readonly Caution[];
}

export type MatchErrorCode =
  | 'phase_needed'
  | 'limit_out_of_range'
  | 'target_not_positive'
  | 'component_q_not_positive'
  | 'velocity_factor_out_of_range'
  | 'band_not_swept'
  | 'design_outside_band'
  | 'load_not_passive';

export interface MatchError {
  readonly code: MatchErrorCode;
  readonly detail: string;
}

/**
 * Networks that match what was swept in a band to a resistance: L-networks, quarter-wave and series
 * sections, single shunt stubs, transformers. Each is designed at one frequency and judged over the
 * whole swept part of the band.
 */
export function matchOptions(sweep: Sweep, request: MatchRequest): Result<MatchAdvice, MatchError> {
  const error = refusal(request);
  if (error !== null) return fail(error);
  if (sweep.phase !== 'signed') {
    return fail({
      code: 'phase_needed',
      detail: 'A match needs the full complex reflection, with the sign of the reactance.',
    });
  }
  const { lowHz, highHz, targetOhm, maxSwr, componentQ } = request;
  const loads = bandLoads(sweep, lowHz, highHz);
  if (loads.frequencyHz.length < 2) {
    return fail({ code: 'band_not_swept', detail: 'Fewer than two points lie inside the band.' });
  }
  const { frequencyHz } = loads;
  const middleHz = Math.sqrt(frequencyHz[0] * frequencyHz[frequencyHz.length - 1]);
  const designHz = request.designHz ?? middleHz;
  const load = loadAt(loads, designHz);
  if (load === null) {
    return fail({
      code: 'design_outside_band',
      detail: `The sweep does not reach ${designHz} Hz inside the band, for which the match is to be made.`,
    });
  }
  if (!(load.re > 0)) {
    return fail({
      code: 'load_not_passive',
      detail: 'The resistance at the design frequency is not positive; nothing can match it.',
    });
  }
  const judge = (elements: readonly MatchElement[]) =>
    bandMatch(loads, elements, targetOhm, maxSwr, componentQ, { frequencyHz: designHz, load });
  const unmatched = judge([]);
  const options = designs(load, designHz, request).map(({ kind, elements }): MatchOption => {
    const nearestElements = elements.map(nearestElement);
    return {
      kind,
      elements,
      exact: judge(elements),
      nearestElements,
      nearest: judge(nearestElements),
    };
  });
  return ok({
    place: request.place,
    designHz,
    load,
    frequencyHz,
    unmatched,
    options: options.filter((option) => serves(option, unmatched)).sort(better),
    assumptions: assumptions(request),
    cautions: cautions(request),
  });
}

/** A transformer is offered only where it does better than nothing, nothing never. */
function serves({ kind, elements, exact }: MatchOption, unmatched: BandMatch): boolean {
  if (elements.length === 0) return false;
  return (
    kind !== 'transformer' ||
    exact.usableWidthHz > unmatched.usableWidthHz ||
    exact.worstSwr < unmatched.worstSwr
  );
}

function better(a: MatchOption, b: MatchOption): number {
  return (
    b.nearest.usableWidthHz - a.nearest.usableWidthHz ||
    a.nearest.worstSwr - b.nearest.worstSwr ||
    a.nearest.worstLossDb - b.nearest.worstLossDb ||
    a.elements.length - b.elements.length
  );
}

function refusal(request: MatchRequest): MatchError | null {
  const { maxSwr, targetOhm, componentQ, velocityFactor } = request;
  if (!(maxSwr > 1)) return { code: 'limit_out_of_range', detail: 'The SWR limit lies above 1.' };
  if (!(targetOhm > 0)) {
    return { code: 'target_not_positive', detail: 'The target is a positive resistance.' };
  }
  if (!(componentQ.inductor > 0 && componentQ.capacitor > 0)) {
    return { code: 'component_q_not_positive', detail: 'The Q of a part is a positive number.' };
  }
  if (!(velocityFactor > 0 && velocityFactor <= 1)) {
    return {
      code: 'velocity_factor_out_of_range',
      detail: 'A velocity factor lies above 0 and up to 1.',
    };
  }
  return null;
}

function assumptions(request: MatchRequest): readonly Assumption[] {
  const { inductor, capacitor } = request.componentQ;
  return [
    {
      code: 'component_q',
      detail: `Coils have Q ${inductor}, capacitors Q ${capacitor}, at every frequency.`,
    },
    {
      code: 'lossless_lines_and_transformers',
      detail:
        'Line sections, stubs and transformers are taken without loss; a real one adds some, and a transformer holds its ratio over part of the spectrum only.',
    },
    {
      code: 'main_line_of_target_impedance',
      detail: `Distances and stubs are cut from line of ${request.targetOhm} ohm, velocity factor ${request.velocityFactor}.`,
    },
  ];
}

function cautions(request: MatchRequest): readonly Caution[] {
  const voltage: Caution = {
    code: 'network_voltage',
    detail:
      'Parts of a matching network carry high voltage and current at modest power: enclose them, choose their ratings with margin, and do not touch or adjust them while anyone may transmit.',
  };
  if (request.place === 'feed_point') return [voltage];
  return [
    {
      code: 'line_loss_stays',
      detail:
        'A network at the shack end lets the transmitter work, but the line beyond it keeps its SWR and the loss that goes with it.',
    },
    voltage,
  ];
}
