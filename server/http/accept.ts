import { Problem } from '../problems.ts';

/**
 * The media type that `Accept` likes best of those offered, the first offered among equals (RFC
 * 9110, section 12.5.1). Throws `not-acceptable` if it takes none.
 */
export function negotiate<Type extends string>(
  accept: string | undefined,
  offered: readonly [Type, ...Type[]],
): Type {
  if (accept === undefined || accept.trim() === '') return offered[0];
  const ranges = accept.split(',').map(parseRange);
  let best = offered[0];
  let bestQuality = 0;
  for (const type of offered) {
    const quality = qualityOf(type, ranges);
    if (quality > bestQuality) {
      best = type;
      bestQuality = quality;
    }
  }
  if (bestQuality > 0) return best;
  throw new Problem('not-acceptable', { detail: `It can be had as ${offered.join(', ')}.` });
}

interface MediaRange {
  readonly range: string;
  readonly quality: number;
}

function parseRange(text: string): MediaRange {
  const [range, ...parameters] = text.split(';').map((part) => part.trim().toLowerCase());
  const weight = parameters.find((parameter) => parameter.startsWith('q='));
  const quality = weight === undefined ? 1 : Number(weight.slice(2));
  return { range, quality: quality >= 0 && quality <= 1 ? quality : 0 };
}

/** The quality of the most specific range that takes the type. */
function qualityOf(type: string, ranges: readonly MediaRange[]): number {
  const [family] = type.split('/', 1);
  for (const wanted of [type, `${family}/*`, '*/*']) {
    const found = ranges.find(({ range }) => range === wanted);
    if (found !== undefined) return found.quality;
  }
  return 0;
}
