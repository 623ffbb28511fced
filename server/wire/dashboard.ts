import { z } from 'zod';
import type { BaselineChange } from '../../core/record/baseline-change.ts';
import type { AntennaStanding, BandStanding, SiteOverview } from '../dashboard/dashboard.ts';
import { standingStates } from '../dashboard/states.ts';
import type { SweepRecord } from '../store/port.ts';
import { toSnakeCase } from './case.ts';
import { frequencySchema, idSchema, inventedSchema, timeSchema } from './common.ts';
import { halfWidth } from './history.ts';
import { rounded } from './rounding.ts';

const stateSchema = z.enum(standingStates).meta({
  description:
    'Of a design band, by its newest good sweep at the limit of the antenna; an antenna has the first of these states that one of its bands has. `untested`: there is no good sweep among the newest eight of the band. `partly_tested`: a part was swept, and is alike throughout.',
});

const sweepSchema = z
  .object({
    id: idSchema,
    measured_at: timeSchema.nullable().meta({ description: 'Null if nobody said.' }),
    received_at: timeSchema,
    url: z.url(),
  })
  .meta({ id: 'DashboardSweep' });

const bandFields = {
  band: z.string(),
  state: stateSchema,
  swept_fraction: z.number().min(0).max(1),
  usable_fraction: z.number().min(0).max(1).meta({ description: 'Unswept is not usable.' }),
  minimum_swr: z.number().nullable(),
  minimum_swr_u95: halfWidth,
  minimum_swr_hz: frequencySchema.nullable(),
  resonances_hz: z.array(z.number()).meta({ description: 'Ascending; none without phase.' }),
};
const antennaFields = {
  key: z.string(),
  name: z.string(),
  kind: z.string(),
  invented: inventedSchema,
  state: stateSchema,
};

const difference = z
  .object({ value: z.number(), u95: halfWidth })
  .nullable()
  .meta({ description: 'Positive for more than in the baseline; null where either lacks it.' });

const changeSchema = z
  .object({
    verdict: z.enum(['same', 'changed', 'unknown']).meta({
      description:
        '`changed`: a difference is beyond its half-width. `unknown`: no half-width is known.',
    }),
    minimum_swr: difference,
    resonance_hz: difference,
    usable_fraction: z.number(),
  })
  .meta({
    id: 'BaselineChange',
    description: 'How a sweep differs from the baseline of its era.',
  });

const bandSchema = z
  .object({
    ...bandFields,
    change: changeSchema
      .nullable()
      .meta({ description: 'Null: there is no baseline, or the sweep is part of it.' }),
    sweep: sweepSchema.nullable(),
  })
  .meta({ id: 'DashboardBand' });
const antennaSchema = z
  .object({
    id: idSchema,
    ...antennaFields,
    latest_sweep: sweepSchema.nullable().meta({ description: 'The newest, good or not.' }),
    due_at: timeSchema
      .nullable()
      .meta({ description: 'When it is to be tested again; null: it has no interval.' }),
    bands: z.array(bandSchema),
    url: z.url(),
    history_url: z.url(),
  })
  .meta({ id: 'DashboardAntenna' });

export const dashboardSchema = z
  .object({
    sites: z.array(
      z.object({
        id: idSchema,
        key: z.string(),
        name: z.string(),
        antennas: z.array(antennaSchema),
        url: z.url(),
      }),
    ),
  })
  .meta({ id: 'Dashboard', description: 'How every antenna of the club stands.' });

const publicBandSchema = z
  .object({ ...bandFields, measured_on: z.iso.date().nullable() })
  .meta({ id: 'PublicBand' });

export const publicDashboardSchema = z
  .object({
    club: z.string(),
    invented: inventedSchema,
    sites: z.array(
      z.object({
        key: z.string(),
        name: z.string(),
        antennas: z.array(z.object({ ...antennaFields, bands: z.array(publicBandSchema) })),
      }),
    ),
  })
  .meta({
    id: 'PublicDashboard',
    description: 'The same without people, places and single sweeps.',
  });

/** A dashboard as members are sent it, with URLs under this one. */
export function dashboardToWire(
  sites: readonly SiteOverview[],
  publicUrl: string,
): z.output<typeof dashboardSchema> {
  return {
    sites: sites.map(({ site, antennas }) => ({
      id: site.id,
      key: site.key,
      name: site.facts.name,
      antennas: antennas.map((standing) => {
        const { id } = standing.antenna;
        return {
          id,
          ...antennaToWire(standing),
          latest_sweep: sweepToWire(standing.latestSweep, publicUrl),
          due_at: standing.dueAtMs === null ? null : new Date(standing.dueAtMs).toISOString(),
          bands: standing.bands.map((band) => ({
            ...bandToWire(band),
            change: changeToWire(standing.changes.get(band.band)),
            sweep: sweepToWire(band.sweep, publicUrl),
          })),
          url: `${publicUrl}/v1/antennas/${id}`,
          history_url: `${publicUrl}/v1/antennas/${id}/history`,
        };
      }),
      url: `${publicUrl}/v1/sites/${site.id}`,
    })),
  };
}

/** A dashboard as anybody is sent it: days for times, no ids, no coordinates, no notes. */
export function publicDashboardToWire(
  club: { readonly name: string; readonly invented: boolean },
  sites: readonly SiteOverview[],
): z.output<typeof publicDashboardSchema> {
  return {
    club: club.name,
    invented: club.invented,
    sites: sites.map(({ site, antennas }) => ({
      key: site.key,
      name: site.facts.name,
      antennas: antennas.map((standing) => ({
        ...antennaToWire(standing),
        bands: standing.bands.map((band) => ({
          ...bandToWire(band),
          measured_on: band.sweep?.facts.measuredAt?.slice(0, 10) ?? null,
        })),
      })),
    })),
  };
}

function antennaToWire({ antenna, state }: AntennaStanding) {
  const { key, facts } = antenna;
  const { name, kind, invented } = facts;
  return { key, name, kind, invented, state };
}

function bandToWire({ band, state, measures }: BandStanding) {
  const minimum = measures?.minimum ?? null;
  return rounded({
    band,
    state,
    swept_fraction: measures?.sweptFraction ?? 0,
    usable_fraction: measures?.usableFraction ?? 0,
    minimum_swr: minimum?.swr ?? null,
    minimum_swr_u95: minimum?.swrU95 ?? null,
    minimum_swr_hz: minimum?.frequencyHz ?? null,
    resonances_hz: measures?.resonances.map(({ frequencyHz }) => frequencyHz) ?? [],
  });
}

function changeToWire(change: BaselineChange | undefined) {
  return change === undefined ? null : rounded(toSnakeCase(change));
}

function sweepToWire(sweep: SweepRecord | null, publicUrl: string) {
  if (sweep === null) return null;
  const { id, receivedAt, facts } = sweep;
  return {
    id,
    measured_at: facts.measuredAt,
    received_at: receivedAt,
    url: `${publicUrl}/v1/sweeps/${id}`,
  };
}
