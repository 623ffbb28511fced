import { z } from 'zod';
import type { AntennaStanding, BandStanding, SiteStanding } from '../dashboard/dashboard.ts';
import { standingStates } from '../dashboard/states.ts';
import type { SweepRecord } from '../store/port.ts';
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

const bandSchema = z
  .object({ ...bandFields, sweep: sweepSchema.nullable() })
  .meta({ id: 'DashboardBand' });
const antennaSchema = z
  .object({
    id: idSchema,
    ...antennaFields,
    latest_sweep: sweepSchema.nullable().meta({ description: 'The newest, good or not.' }),
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
  sites: readonly SiteStanding[],
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
          bands: standing.bands.map((band) => ({
            ...bandToWire(band),
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
  sites: readonly SiteStanding[],
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
