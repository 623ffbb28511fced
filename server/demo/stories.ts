/** What was built into the invented record, so that tests know what an analysis should find. */
export interface DemoStory {
  readonly key: string;
  readonly antennaKey: string | null;
  readonly analyzerKey: string | null;
  /** RFC 3339 UTC; null: all the time. */
  readonly from: string | null;
  readonly until: string | null;
  readonly text: string;
}

function story(facts: Partial<DemoStory> & Pick<DemoStory, 'key' | 'text'>): DemoStory {
  return { antennaKey: null, analyzerKey: null, from: null, until: null, ...facts };
}

export const minimumApart = story({
  key: 'minimum-apart-from-resonance',
  antennaKey: 'hilltop-20m',
  text: 'A short dipole with loading coils and a matching coil across the feed: SWR is least near 14.15 MHz, while the reactance is zero about 100 kHz above and below it, where SWR is about 2.',
});

export const slowDrift = story({
  key: 'slow-drift',
  antennaKey: 'hilltop-40m',
  text: 'The wire stretches by 0.6 % in two years; its resonance falls by about 0.3 % a year.',
});

export const suddenFault = story({
  key: 'sudden-fault',
  antennaKey: 'boathouse-beam',
  from: '2026-01-17T00:00:00Z',
  until: '2026-04-11T00:00:00Z',
  text: 'A storm bends the driven element and its joint corrodes: resistance rises and the minimum moves up by some hundred kilohertz until the repair.',
});

export const wetOnly = story({
  key: 'wet-only',
  antennaKey: 'hilltop-ocf',
  from: '2025-09-01T00:00:00Z',
  text: 'Water gets into the transformer box through a cracked lid: only in wet weather does SWR change.',
});

export const wetGround = story({
  key: 'wet-ground',
  antennaKey: 'hilltop-vertical',
  text: 'The ground loss falls from 16 to 9 ohm when the ground is wet, and SWR rises: less loss, higher SWR.',
});

export const lineReplaced = story({
  key: 'line-replaced',
  antennaKey: 'boathouse-2m',
  from: '2025-10-04T00:00:00Z',
  text: 'The feed line had aged to more than twice its loss, which hid the mismatch at the antenna; with the new line SWR at the radio is higher and the antenna no worse.',
});

export const trimmed = story({
  key: 'trimmed',
  antennaKey: 'boathouse-10m',
  from: '2025-05-03T00:00:00Z',
  text: 'Cut too long at first; 10 cm shorter since, and the resonance about 0.6 MHz higher.',
});

export const retuned = story({
  key: 'tuned-each-time',
  antennaKey: 'boathouse-loop',
  text: 'A small loop is tuned anew for each use: its resonance says where the capacitor stood, not that the antenna changed.',
});

export const readsHigh = story({
  key: 'analyzer-reads-high',
  analyzerKey: 'handheld',
  text: 'The field handheld shows frequencies 0.3 % too high.',
});

export const demoStories: readonly DemoStory[] = [
  minimumApart,
  slowDrift,
  suddenFault,
  wetOnly,
  wetGround,
  lineReplaced,
  trimmed,
  retuned,
  readsHigh,
];

/** Whether a story is under way at an instant (RFC 3339 UTC, `Z`). */
export function isUnderWay({ from, until }: DemoStory, at: string): boolean {
  return (from === null || from <= at) && (until === null || at < until);
}
