import type { RangeUse } from './usable-report.ts';

/** A band's verdict in a sentence or two, for a person who reads the numbers. */
export function bandDetail(use: RangeUse, maxSwr: number): string {
  const sentences = [verdictSentence(use, maxSwr)];
  if (use.permission === 'national') {
    sentences.push('Every row here holds only where a national administration permits it.');
  }
  if (use.permission === 'part_national') {
    sentences.push('The rows that need a national permission are left out.');
  }
  if (use.marginal) {
    sentences.push(
      'The verdict hangs on a difference smaller than the half-width of the measurement.',
    );
  }
  return sentences.join(' ');
}

function verdictSentence(use: RangeUse, maxSwr: number): string {
  const swept = percent(use.sweptFraction);
  const usable = percent(use.usableFraction);
  if (use.permission === 'national' && use.verdict !== 'not_swept') {
    return 'Nothing here is generally permitted, whatever the SWR.';
  }
  switch (use.verdict) {
    case 'usable':
      return `SWR is at or below ${maxSwr} on the whole band.`;
    case 'partly_usable':
      return `SWR is at or below ${maxSwr} on ${usable} of the band and above it elsewhere; ${swept} of the band was swept.`;
    case 'not_usable':
      return `SWR is above ${maxSwr} on the whole band.`;
    case 'partly_swept':
      return `Only ${use.sweptFraction > 0 ? swept : 'one frequency'} of the band was swept; SWR is ${isWithin(use, maxSwr) ? 'at or below' : 'above'} ${maxSwr} there, and the rest is unknown.`;
    case 'not_swept':
      return 'The sweep does not reach this band.';
  }
}

/** A part that was swept and does not decide is within the limit everywhere or nowhere. */
function isWithin(use: RangeUse, maxSwr: number): boolean {
  return use.worstSwr !== null && use.worstSwr <= maxSwr;
}

/** Whole percents, but never 0 or 100 for a part. */
function percent(fraction: number): string {
  if (fraction <= 0 || fraction >= 1) return `${fraction * 100} %`;
  const rounded = Math.round(fraction * 100);
  if (rounded === 0) return 'less than 1 %';
  return rounded === 100 ? 'more than 99 %' : `${rounded} %`;
}
