import { z } from 'zod';
import { type ToldEvent, type ToldEventKind, toldEventKinds } from '../store/events.ts';
import { idSchema, timeSchema } from './common.ts';

/** Where the subject of an event is read. */
const eventPaths: Readonly<Record<ToldEventKind, (event: ToldEvent) => string>> = {
  club_added: () => '/v1/club',
  club_edited: () => '/v1/club',
  sites_added: ({ subjectId }) => `/v1/sites/${subjectId}`,
  sites_edited: ({ subjectId }) => `/v1/sites/${subjectId}`,
  antennas_added: ({ subjectId }) => `/v1/antennas/${subjectId}`,
  antennas_edited: ({ subjectId }) => `/v1/antennas/${subjectId}`,
  analyzers_added: ({ subjectId }) => `/v1/analyzers/${subjectId}`,
  analyzers_edited: ({ subjectId }) => `/v1/analyzers/${subjectId}`,
  cable_added: ({ subjectId }) => `/v1/cables/${subjectId}`,
  load_check_added: ({ details: { analyzerId } }) =>
    analyzerId === undefined ? '/v1/analyzers' : `/v1/analyzers/${analyzerId}/load-checks`,
  line_check_added: (event) => ofAntenna(event, `/line-checks/${event.subjectId}`),
  sweep_added: ({ subjectId }) => `/v1/sweeps/${subjectId}`,
  sweep_corrected: ({ subjectId }) => `/v1/sweeps/${subjectId}`,
  work_added: (event) => ofAntenna(event, `/work/${event.subjectId}`),
  work_withdrawn: (event) => ofAntenna(event, `/work/${event.subjectId}`),
  baseline_chosen: (event) => ofAntenna(event, '/baselines'),
  test_overdue: (event) => ofAntenna(event, '/sweeps'),
  test_interval_set: () => '/v1/due',
  round_added: ({ subjectId }) => `/v1/rounds/${subjectId}`,
};

/** Events of an earlier version do not name the antenna. */
function ofAntenna({ details }: ToldEvent, below: string): string {
  const { antennaId } = details;
  return antennaId === undefined ? '/v1/antennas' : `/v1/antennas/${antennaId}${below}`;
}

export const eventKindSchema = z.enum(toldEventKinds);

const eventSchema = z
  .object({
    id: z
      .string()
      .regex(/^\d+$/)
      .meta({ description: 'Grows with each event; `Last-Event-ID` takes it.' }),
    kind: eventKindSchema,
    at: timeSchema,
    subject_id: idSchema.meta({ description: 'What was added or changed.' }),
    antenna_id: idSchema.nullable().meta({ description: 'The antenna that it concerns.' }),
    member_id: idSchema.nullable().meta({ description: 'Null: the service itself.' }),
    url: z.url().meta({ description: 'Where to read it.' }),
  })
  .meta({ id: 'Event', description: 'Something that happened in the club’s records.' });

/** An event as it is sent, with URLs under this one. */
export function eventToWire(event: ToldEvent, publicUrl: string): z.output<typeof eventSchema> {
  const { seq, kind, at, subjectId, memberId, details } = event;
  return {
    id: String(seq),
    kind,
    at,
    subject_id: subjectId,
    antenna_id: details.antennaId ?? null,
    member_id: memberId === '' ? null : memberId,
    url: publicUrl + eventPaths[kind](event),
  };
}
