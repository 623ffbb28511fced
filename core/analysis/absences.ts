import type { Analysis } from './analysis.ts';
import type { Absence, Summary } from './summary.ts';

/** A summary but for the list of what is absent from it. */
export type Draft = Omit<Summary, 'absent'>;

interface Reason {
  readonly code: string;
  readonly detail: string;
}

const reasons = {
  phaseNotMeasured: {
    code: 'phase_not_measured',
    detail: 'Only the magnitude of the reflection was measured, so no impedance is known.',
  },
  signUnknown: {
    code: 'reactance_sign_unknown',
    detail:
      'The sign of the reactance was not measured: where it changes, and so where the antenna resonates, cannot be told.',
  },
  onePoint: { code: 'one_point', detail: 'The sweep has one point: nothing changes along it.' },
  noCrossing: {
    code: 'no_crossing',
    detail: 'The reactance does not change its sign within the sweep. Sweep wider.',
  },
  onlyGrazing: {
    code: 'only_grazing',
    detail: 'The reactance touches zero within the noise but crosses it nowhere beyond doubt.',
  },
  atEdge: {
    code: 'minimum_at_edge',
    detail: 'The sweep ends before the SWR turns, so its true minimum lies outside. Sweep wider.',
  },
  totalReflection: {
    code: 'total_reflection',
    detail: 'The reflection is total there, so SWR has no finite value.',
  },
  noiseUnknown: {
    code: 'too_few_points',
    detail: 'Too few points to tell noise from shape, so no half-width can be given.',
  },
  noSingleFrequency: {
    code: 'not_one_frequency',
    detail: 'The curve is too flat there, within the noise, for one frequency to be named.',
  },
  openEnd: {
    code: 'sweep_ends',
    detail:
      'The sweep ends before the SWR passes the limit: this is the end of the sweep, no edge.',
  },
  perfectMatch: {
    code: 'perfect_match',
    detail: 'Nothing is reflected there, so the return loss has no finite value.',
  },
  notPassive: {
    code: 'resistance_not_positive',
    detail: 'The resistance is not positive there, so Q has no meaning. Check the calibration.',
  },
  edgesOutside: {
    code: 'bandwidth_beyond_sweep',
    detail: 'The sweep ends before the SWR of the matched antenna passes the limit. Sweep wider.',
  },
} as const satisfies Record<string, Reason>;

/** Why fields of the summary are null or empty: one entry for each field and reason. */
export function absences(analysis: Analysis, draft: Draft): readonly Absence[] {
  const absent = new Map<string, Absence>();
  const add = (field: string, reason: Reason) => {
    absent.set(`${field} ${reason.code}`, { field, code: reason.code, detail: reason.detail });
  };
  addResonances(analysis, draft, add);
  addMinima(analysis, draft, add);
  addSpans(analysis, draft, add);
  if (draft.span.medianStepHz === null) add('span.median_step_hz', reasons.onePoint);
  if (draft.quality.reflectionNoise === null)
    add('quality.reflection_noise', noiseReason(analysis));
  return [...absent.values()];
}

type Add = (field: string, reason: Reason) => void;

function noiseReason({ sweep }: Analysis): Reason {
  return sweep.frequencyHz.length < 2 ? reasons.onePoint : reasons.noiseUnknown;
}

/** Why a half-width is null where the sweep has what it is a half-width of. */
function u95Reason(analysis: Analysis): Reason {
  return analysis.noise === null ? noiseReason(analysis) : reasons.noSingleFrequency;
}

function phaseReason({ sweep }: Analysis): Reason | null {
  if (sweep.phase === 'none') return reasons.phaseNotMeasured;
  return sweep.phase === 'unsigned' ? reasons.signUnknown : null;
}

function addResonances(analysis: Analysis, draft: Draft, add: Add): void {
  const { resonances, resonanceOffsetHz, minimumSwr } = draft;
  const isOnePoint = analysis.sweep.frequencyHz.length < 2;
  const none = phaseReason(analysis) ?? (isOnePoint ? reasons.onePoint : reasons.noCrossing);
  if (resonances.length === 0) add('resonances', none);
  if (analysis.sweep.phase === 'none') {
    add('reactance_magnitude_minima', reasons.phaseNotMeasured);
  }
  if (resonanceOffsetHz === null) {
    const isMinimum = minimumSwr !== null && resonances.length > 0;
    const isGrazing = isMinimum && resonances.every((resonance) => resonance.grazing);
    if (isGrazing) add('resonance_offset_hz', reasons.onlyGrazing);
    else if (isMinimum) add('resonance_offset_hz', reasons.atEdge);
    else add('resonance_offset_hz', resonances.length === 0 ? none : reasons.totalReflection);
  }
  for (const resonance of resonances) {
    const grazingOr = resonance.grazing ? reasons.onlyGrazing : u95Reason(analysis);
    if (resonance.frequencyU95Hz === null) add('resonances.frequency_u95_hz', grazingOr);
    if (resonance.resistanceOhm === null) add('resonances.resistance_ohm', reasons.notPassive);
    if (resonance.resistanceU95Ohm === null) {
      const isThere = resonance.resistanceOhm !== null;
      add('resonances.resistance_u95_ohm', isThere ? u95Reason(analysis) : reasons.notPassive);
    }
    if (resonance.swr === null) add('resonances.swr', reasons.totalReflection);
    if (resonance.swrU95 === null) {
      const isThere = resonance.swr !== null;
      add('resonances.swr_u95', isThere ? u95Reason(analysis) : reasons.totalReflection);
    }
    if (resonance.q === null) add('resonances.q', reasons.notPassive);
    if (resonance.qU95 === null) {
      add('resonances.q_u95', resonance.q === null ? reasons.notPassive : u95Reason(analysis));
    }
    addBandwidth(analysis, resonance, add);
  }
}

function addBandwidth(
  analysis: Analysis,
  { matchedBandwidth, grazing }: Draft['resonances'][number],
  add: Add,
): void {
  const field = 'resonances.matched_bandwidth';
  if (matchedBandwidth === null) {
    add(field, grazing ? reasons.onlyGrazing : reasons.notPassive);
    return;
  }
  const { predictedU95Hz, measuredHz, measuredU95Hz } = matchedBandwidth;
  if (predictedU95Hz === null) add(`${field}.predicted_u95_hz`, u95Reason(analysis));
  if (measuredHz === null) add(`${field}.measured_hz`, reasons.edgesOutside);
  if (measuredU95Hz === null) {
    const isThere = measuredHz !== null;
    add(`${field}.measured_u95_hz`, isThere ? u95Reason(analysis) : reasons.edgesOutside);
  }
}

function addMinima(analysis: Analysis, draft: Draft, add: Add): void {
  const { minimumSwr, swrMinima, reactanceMagnitudeMinima } = draft;
  if (minimumSwr === null) {
    add('minimum_swr', reasons.totalReflection);
    add('swr_minima', reasons.totalReflection);
  }
  for (const [field, minima] of [
    ['minimum_swr', minimumSwr === null ? [] : [minimumSwr]],
    ['swr_minima', swrMinima],
  ] as const) {
    for (const minimum of minima) {
      if (minimum.frequencyU95Hz === null) {
        const isOwn = analysis.noise !== null && minimum.atEdge;
        add(`${field}.frequency_u95_hz`, isOwn ? reasons.atEdge : u95Reason(analysis));
      }
      if (minimum.swrU95 === null) add(`${field}.swr_u95`, u95Reason(analysis));
      const phase = phaseReason(analysis) ?? reasons.totalReflection;
      if (minimum.resistanceOhm === null) add(`${field}.resistance_ohm`, phase);
      if (minimum.reactanceOhm === null) add(`${field}.reactance_ohm`, phase);
      if (minimum.returnLossDb === null) add(`${field}.return_loss_db`, reasons.perfectMatch);
    }
  }
  for (const { frequencyU95Hz, resistanceOhm } of reactanceMagnitudeMinima) {
    const field = 'reactance_magnitude_minima';
    if (frequencyU95Hz === null) add(`${field}.frequency_u95_hz`, reasons.noSingleFrequency);
    if (resistanceOhm === null) add(`${field}.resistance_ohm`, reasons.totalReflection);
  }
}

function addSpans(analysis: Analysis, { spans }: Draft, add: Add): void {
  for (const { lowOpen, highOpen, lowU95Hz, highU95Hz } of spans) {
    if (lowU95Hz === null) add('spans.low_u95_hz', lowOpen ? reasons.openEnd : u95Reason(analysis));
    if (highU95Hz === null) {
      add('spans.high_u95_hz', highOpen ? reasons.openEnd : u95Reason(analysis));
    }
  }
}
