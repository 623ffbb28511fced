import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { tellOverdue } from '../../server/events/overdue.ts';
import { addAntenna, resonatorFile, upload } from '../support/club-records.ts';
import { makeTestApp, type TestApp } from '../support/test-app.ts';

let club: TestApp;
let antennaId: unknown;
beforeAll(async () => {
  club = await makeTestApp();
  antennaId = (await addAntenna(club, { test_interval_days: 30 }))['id'];
});
afterAll(() => club.close());

const day = 24 * 3600 * 1000;

/** The events of that kind that were ever told. */
async function told() {
  const events = await club.service.store.listEvents(club.actor.clubId, 0, 1000);
  return events.filter(({ kind }) => kind === 'test_overdue');
}

describe('an antenna whose test is overdue', () => {
  it('is not told before its first test, nor before the interval has passed', async () => {
    await tellOverdue(club.service);
    await upload(club, resonatorFile(), '?measured_at=2026-05-30T12:00:00Z');
    club.clock.ms = Date.parse('2026-06-29T11:59:59Z');
    await tellOverdue(club.service);
    expect(await told()).toEqual([]);
  });

  it('is told once, by the service itself', async () => {
    club.clock.ms += 2000;
    await tellOverdue(club.service);
    club.clock.ms += day;
    await tellOverdue(club.service);
    expect(await told()).toMatchObject([
      { subjectId: antennaId, memberId: '', details: { antennaId } },
    ]);
  });

  it('is told again when a later test is overdue in turn', async () => {
    const file = resonatorFile({ comment: 'tested again' });
    await upload(club, file, '?measured_at=2026-06-30T10:00:00Z');
    await tellOverdue(club.service);
    expect(await told()).toHaveLength(1);
    club.clock.ms = Date.parse('2026-07-30T10:00:01Z');
    await tellOverdue(club.service);
    expect(await told()).toHaveLength(2);
  });
});
