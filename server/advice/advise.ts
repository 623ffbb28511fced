import { standingCautions } from '../../core/advice/cautions.ts';
import type { Aim, Finding } from '../../core/advice/finding.ts';
import { findings } from '../../core/advice/findings.ts';
import { type HotSpots, hotSpots } from '../../core/advice/hot-spots.ts';
import { type MatchAdvice, matchOptions } from '../../core/advice/match/match-options.ts';
import { powerCautions } from '../../core/advice/power.ts';
import { isMonopole, radiatorOf } from '../../core/advice/radiator.ts';
import type { TrimAdvice } from '../../core/advice/trim-request.ts';
import type { Absence, Caution, Summary } from '../../core/analysis/summary.ts';
import type { UsableReport } from '../../core/bands/usable-report.ts';
import type { FeedLine } from '../../core/line/feed-line.ts';
import { fail, type Result } from '../../core/result.ts';
import type { ReportBasis } from '../report-basis.ts';
import type { SweepView } from '../sweep-view.ts';
import type { AdviceRequest, AdvisedAntenna } from './advice-request.ts';
import { type ChosenAim, chosenAim, named } from './chosen-aim.ts';
import {
  absence,
  feedPointSweep,
  impedanceAt,
  type PowerAdvice,
  powerAdvice,
} from './power-advice.ts';
import { nearestResonance, trimStep } from './trim-step.ts';

type Reason = Pick<Absence, 'code' | 'detail'>;

/** What to do next about an antenna, from one sweep of it. */
export interface Advice extends ChosenAim {
  readonly findings: readonly Finding[];
  readonly trim: TrimAdvice | null;
  readonly match: MatchAdvice | null;
  readonly power: PowerAdvice | null;
  readonly hotSpots: HotSpots | null;
  readonly absent: readonly Absence[];
  readonly cautions: readonly Caution[];
}

/** All that is known where an advice begins. */
export interface AdviceParts {
  readonly basis: ReportBasis;
  readonly view: SweepView;
  readonly report: UsableReport;
  readonly antenna: AdvisedAntenna;
  readonly request: AdviceRequest;
}

/** Advises on one sweep; what cannot be advised is absent with the reason. */
export function advise(parts: AdviceParts): Advice {
  const { basis, view, report, antenna, request } = parts;
  const aim = chosenAim(request, report, basis.designBands);
  const { summary } = view;
  const lineFlags = view.line?.flags ?? [];
  const throughLine = lineFlags.some(({ code }) => code === 'line_moves_resonance');
  const trim = trimStep(summary, antenna, request, aim.targetHz, throughLine);
  const match = matchStep(parts, aim);
  const atHz = advisedHz(summary, aim);
  const power = powerStep(parts, atHz);
  const hot = hotSpotStep(parts, atHz);
  const reasons = view.line?.conditioning?.reasons ?? [];
  return {
    ...aim,
    findings: findings(summary, report, {
      kind: antenna.kind,
      maxSwr: basis.maxSwr,
      designBands: request.band === null ? basis.designBands : [request.band],
      aims: request.aim === null ? [] : [named(request.aim)],
      lineFlags,
    }),
    trim: trim.ok ? trim.value : null,
    match: match.ok ? match.value : null,
    power: power.ok ? power.value : null,
    hotSpots: hot.ok ? hot.value : null,
    absent: [
      ...absentOf('trim', trim),
      ...absentOf('match', match),
      ...absentOf('power', power),
      ...(power.ok ? power.value.absent : []),
      ...absentOf('hot_spots', hot),
    ],
    cautions: [...reasons, ...(request.powerW === null ? [] : powerCautions), ...standingCautions],
  };
}

/** Velocity factor of solid polyethylene, the commonest line (common practice, no source). */
const usualVelocityFactor = 0.66;

function matchStep(
  { basis, view, request }: AdviceParts,
  { range, targetHz }: ChosenAim,
): Result<MatchAdvice, Reason> {
  if (range === null) {
    return fail({ code: 'no_band', detail: 'The sweep reaches no band: name one, or an aim.' });
  }
  const { sections } = recordedLine(basis) ?? { sections: [] };
  return matchOptions(view.sweep, {
    place: isAtFeedPoint(basis) ? 'feed_point' : 'line_end',
    lowHz: range.lowHz,
    highHz: range.highHz,
    maxSwr: basis.maxSwr,
    targetOhm: basis.referenceOhm,
    designHz: isSwept(view.summary, range, targetHz) ? targetHz : null,
    componentQ: request.componentQ,
    velocityFactor:
      request.velocityFactor ?? sections[0]?.cable.velocityFactor ?? usualVelocityFactor,
  });
}

function powerStep(
  { basis, view, request }: AdviceParts,
  atHz: number | null,
): Result<PowerAdvice, Reason> {
  const { powerW } = request;
  if (powerW === null) return fail(powerNotGiven);
  if (atHz === null) return fail(nothingSeen);
  const impedance = impedanceAt(feedPointSweep(basis, view.sweep), atHz);
  return { ok: true, value: powerAdvice(powerW, atHz, impedance, recordedLine(basis)) };
}

/** A resonance further off than this, as a fraction, is not that of the frequency asked. */
const meantFor = 0.1;

function hotSpotStep(
  { basis, view, antenna, request }: AdviceParts,
  atHz: number | null,
): Result<HotSpots, Reason> {
  const radiator = radiatorOf(antenna.kind);
  if (radiator === null) {
    return fail({
      code: 'distribution_unknown',
      detail:
        'Where current and voltage are high on this kind of antenna is not known to theory here. Take every part of it for hot.',
    });
  }
  const { powerW, lengthM, radiusM } = request;
  if (powerW === null) return fail(powerNotGiven);
  if (atHz === null) return fail(nothingSeen);
  const resonance = isAtFeedPoint(basis) ? nearestResonance(view.summary, atHz) : null;
  const isMeant = resonance !== null && Math.abs(resonance.frequencyHz / atHz - 1) <= meantFor;
  return hotSpots({
    radiator,
    frequencyHz: atHz,
    powerW,
    feedResistanceOhm: isMeant ? resonance.resistanceOhm : null,
    armM: lengthM === null || isMonopole(radiator) ? lengthM : lengthM / 2,
    radiusM,
  });
}

const powerNotGiven: Reason = {
  code: 'power_not_given',
  detail: 'Say with `power_w` at which power; none is assumed.',
};
const nothingSeen: Reason = {
  code: 'no_frequency',
  detail: 'The sweep shows no frequency at which this could be said.',
};

/** Where voltages are told: at the target if it was swept, else at the least SWR. */
function advisedHz(summary: Summary, { targetHz }: ChosenAim): number | null {
  return isSwept(summary, summary.span, targetHz)
    ? targetHz
    : (summary.minimumSwr?.frequencyHz ?? null);
}

function isSwept({ span }: Summary, range: Omit<Aim, 'name'>, hz: number | null): hz is number {
  if (hz === null || hz < span.lowHz || hz > span.highHz) return false;
  return hz >= range.lowHz && hz <= range.highHz;
}

function isAtFeedPoint(basis: ReportBasis): boolean {
  return basis.plane === 'feed_point' || recordedLine(basis)?.sections.length === 0;
}

function recordedLine({ line }: ReportBasis): FeedLine | null {
  return line?.resolved.ok === true ? line.resolved.value : null;
}

function absentOf(field: string, result: Result<unknown, Reason>): readonly Absence[] {
  return result.ok ? [] : [absence(field, result.error)];
}
