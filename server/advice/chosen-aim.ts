import type { Aim } from '../../core/advice/finding.ts';
import type { UsableReport } from '../../core/bands/usable-report.ts';
import type { AdviceRequest } from './advice-request.ts';

/** What an advice is for: a part of the spectrum, and the frequency in it that is wanted. */
export interface ChosenAim {
  /** Null where the sweep reaches no band and none was asked. */
  readonly range: Aim | null;
  readonly targetHz: number | null;
  readonly targetFrom: 'asked' | 'middle' | null;
}

/** As asked; else the first design band that was swept, else the band that was swept most of. */
export function chosenAim(
  { band, aim, targetHz }: AdviceRequest,
  report: UsableReport,
  designBands: readonly string[],
): ChosenAim {
  const range = aim === null ? bandAim(band, report, designBands) : named(aim);
  if (targetHz !== null) return { range, targetHz, targetFrom: 'asked' };
  if (range === null) return { range, targetHz: null, targetFrom: null };
  return { range, targetHz: (range.lowHz + range.highHz) / 2, targetFrom: 'middle' };
}

/** A range as an aim with a name for sentences. */
export function named({ lowHz, highHz }: Omit<Aim, 'name'>): Aim {
  return { name: `${lowHz / 1e6} to ${highHz / 1e6} MHz`, lowHz, highHz };
}

function bandAim(
  asked: string | null,
  { bands }: UsableReport,
  designBands: readonly string[],
): Aim | null {
  const swept = bands
    .filter(({ sweptFraction }) => sweptFraction > 0)
    .toSorted((a, b) => b.sweptFraction - a.sweptFraction);
  const found =
    asked === null
      ? (swept.find(({ band }) => designBands.includes(band)) ?? swept[0])
      : bands.find(({ band }) => band === asked);
  if (found === undefined) return null;
  return { name: found.band, lowHz: found.lowHz, highHz: found.highHz };
}
