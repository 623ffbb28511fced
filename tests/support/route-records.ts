import { sampleLineFile } from '../../server/sample-file.ts';
import { addAntenna, resonatorFile, upload } from './club-records.ts';
import { addMember } from './members.ts';
import type { TestApp } from './test-app.ts';

/**
 * An id of the club for each path parameter that names a record of a club. The analyzer is added by
 * `measurer`, who may edit it for that reason.
 */
export async function addRouteRecords(
  club: TestApp,
  measurer: TestApp,
): Promise<Readonly<Record<string, string>>> {
  const post = async (
    url: string,
    payload: object | string,
    asker = club,
  ): Promise<{ readonly id: string }> => {
    const type = typeof payload === 'string' ? 'application/octet-stream' : 'application/json';
    const headers = { 'content-type': type };
    const answer = await asker.call({ method: 'POST', url, payload, headers });
    if (answer.statusCode !== 201) throw new Error(`${url}: ${answer.body}`);
    return answer.json();
  };
  const { id: antenna, site_id: site } = await addAntenna(club);
  const analyzer = await post('/v1/analyzers', { key: 'field-unit', name: 'Field unit' }, measurer);
  const file = resonatorFile();
  const sweep = (await upload(club, file)).json();
  const check = await post(
    '/v1/antennas/field-20m/line-checks?far_end=open&cable=m17-74-rg213&known_length_m=12',
    sampleLineFile(),
  );
  const cable = await post('/v1/cables', {
    key: 'own-coax',
    name: 'Own coax',
    characteristic_ohm: 50,
    velocity_factor: 0.8,
    points: [
      { frequency_hz: 5_000_000, loss_db_per_100_m: 1.9 },
      { frequency_hz: 50_000_000, loss_db_per_100_m: 4.8 },
      { frequency_hz: 200_000_000, loss_db_per_100_m: 9.7 },
    ],
    source: 'its sheet',
  });
  const work = await post('/v1/antennas/field-20m/work', {
    kind: 'trimmed',
    done_at: '2026-05-17T13:00:00Z',
    length_mm: 120,
  });
  const webhook = await post('/v1/webhooks', { url: 'https://receiver.example/ledger' });
  const member = await addMember(club, 'reader');
  await post('/v1/analyzers', { key: 'second-unit', name: 'Second unit' });
  const round = await post('/v1/rounds', {
    name: 'Round',
    antenna: 'field-20m',
    analyzers: ['field-unit', 'second-unit'],
    begins_at: '2026-05-01T00:00:00Z',
    ends_at: '2026-06-01T00:00:00Z',
  });
  return {
    antenna: String(antenna),
    site: String(site),
    analyzer: analyzer.id,
    sweep: sweep.id,
    other: sweep.id,
    webhook: webhook.id,
    check: check.id,
    cable: cable.id,
    work: work.id,
    round: round.id,
    member: member.id,
    token: member.tokenId,
  };
}
