import type { Cable } from '../../core/line/cable.ts';
import type { FeedLine } from '../../core/line/feed-line.ts';
import { fail, ok, type Result } from '../../core/result.ts';
import type { TestedLine } from '../store/port.ts';
import type { LineToCheck } from './line-check.ts';

/** What a request tells of the line; undefined is not told. */
export interface ToldLine
  extends Pick<TestedLine, 'farEnd' | 'loadOhm' | 'window' | 'compensateLoss'> {
  readonly cable: Cable | undefined;
  readonly lengthM: number | undefined;
  readonly lengthU95M: number | undefined;
  readonly velocityFactor: number | undefined;
  readonly velocityFactorU95: number | undefined;
}

export interface ToldTooLittle {
  readonly code: 'line_not_told';
  readonly detail: string;
}

/**
 * The line as it is checked: as told; what is not told is taken from the record of the antenna,
 * where that is a line of one kind of cable, and said.
 */
export function lineToCheck(
  told: ToldLine,
  recorded: FeedLine | null,
): Result<LineToCheck, ToldTooLittle> {
  const { farEnd, loadOhm, window, compensateLoss, velocityFactor } = told;
  const uniform = uniformLine(recorded);
  const needsCable = told.cable === undefined && velocityFactor === undefined;
  if (needsCable && uniform === null) {
    return fail({
      code: 'line_not_told',
      detail:
        'The antenna has no feed line of one known cable, so name the `cable`, or give a `velocity_factor`.',
    });
  }
  const cable = told.cable ?? (needsCable ? (uniform?.cable ?? null) : null);
  const isAllRecorded = needsCable && told.lengthM === undefined;
  const length = isAllRecorded
    ? { lengthM: uniform?.lengthM ?? null, lengthU95M: uniform?.lengthU95M ?? null }
    : { lengthM: told.lengthM ?? null, lengthU95M: told.lengthU95M ?? null };
  const tested: TestedLine = {
    farEnd,
    loadOhm,
    cable: cable?.id ?? null,
    ...length,
    velocityFactor: velocityFactor ?? null,
    velocityFactorU95: told.velocityFactorU95 ?? null,
    window,
    compensateLoss,
  };
  const taken = isAllRecorded ? `${cable?.name}, ${length.lengthM} m` : `${cable?.name}`;
  const assumptions = needsCable
    ? [{ code: 'line_from_record', detail: `Taken from the record of the antenna: ${taken}.` }]
    : [];
  return ok({ tested, cable, assumptions });
}

interface UniformLine {
  readonly cable: Cable;
  readonly lengthM: number;
  readonly lengthU95M: number;
}

/** All sections as one; null where they are of several cables or none. */
function uniformLine(line: FeedLine | null): UniformLine | null {
  const [first, ...rest] = line?.sections ?? [];
  if (first === undefined || rest.some(({ cable }) => cable.id !== first.cable.id)) return null;
  const all = [first, ...rest];
  const lengthM = all.reduce((sum, section) => sum + section.lengthM, 0);
  if (lengthM === 0) return null;
  const lengthU95M = all.reduce((sum, section) => sum + section.lengthU95M, 0);
  return { cable: first.cable, lengthM, lengthU95M };
}
