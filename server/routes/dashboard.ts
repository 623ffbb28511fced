import { z } from 'zod';
import { analysisVersion } from '../../core/analysis/summarise.ts';
import { principalOf } from '../auth/bearer.ts';
import { dashboardOf } from '../dashboard/dashboard.ts';
import type { App } from '../http/app-type.ts';
import { derivedTag } from '../http/etags.ts';
import { KeptAnswers } from '../http/kept-answers.ts';
import { Problem } from '../problems.ts';
import type { Service } from '../service.ts';
import type { ClubState } from '../store/people.ts';
import { keySchema, noQuery, readHeaders } from '../wire/common.ts';
import {
  dashboardSchema,
  dashboardToWire,
  publicDashboardSchema,
  publicDashboardToWire,
} from '../wire/dashboard.ts';
import { answers, commonProblems, jsonAnswer, notModified } from '../wire/problem.ts';

const tags = ['dashboard'];

/** How everything stands, in one answer. */
export function dashboardRoutes(app: App, service: Service): void {
  const { store, publicUrl } = service;
  const kept = new KeptAnswers(store);
  /** Whatever changes the answer writes an event, so the newest one names the state. */
  const tagOf = async (name: string, clubId: string) =>
    derivedTag([name, clubId, analysisVersion, await store.newestSeq(clubId)]);

  app.get(
    '/v1/dashboard',
    {
      config: { right: 'read' },
      schema: {
        operationId: 'getDashboard',
        tags,
        summary: 'How every antenna of the club stands',
        description:
          'For each design band the newest good sweep: one without values beyond a passive antenna’s, clipped ones, or an open or short in place of the antenna.',
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The dashboard.', dashboardSchema), ...notModified },
          commonProblems,
        ),
      },
    },
    (request, reply) => {
      const { clubId } = principalOf(request);
      return kept.send(request, reply, async () => ({
        tag: await tagOf('dashboard', clubId),
        text: async () =>
          JSON.stringify(dashboardToWire(await dashboardOf(service, clubId), publicUrl)),
      }));
    },
  );

  app.get(
    '/v1/public/:club/dashboard',
    {
      config: { right: 'public' },
      schema: {
        operationId: 'getPublicDashboard',
        tags,
        summary: 'How the antennas of a club stand, where the club shows it to anybody',
        description:
          'Without people, places and single sweeps. A club that does not show it is answered for as one that does not exist.',
        params: z.strictObject({ club: keySchema }),
        querystring: noQuery,
        headers: readHeaders,
        response: answers(
          { 200: jsonAnswer('The dashboard.', publicDashboardSchema), ...notModified },
          [
            'invalid-request',
            'malformed-request',
            'token-in-url',
            'not-found',
            'uri-too-long',
            'headers-too-large',
            'internal',
            'unavailable',
          ],
        ),
      },
    },
    async (request, reply) => {
      const club = await showingClub(service, request.params.club);
      return kept.sendOf(club.id, request, reply, async () => ({
        tag: await tagOf('public-dashboard', club.id),
        text: async () => {
          const { invented, facts } = club;
          const sites = await dashboardOf(service, club.id);
          return JSON.stringify(publicDashboardToWire({ name: facts.name, invented }, sites));
        },
      }));
    },
  );
}

/** The club of this key, if it shows its dashboard to anybody. Throws `not-found`. */
async function showingClub({ store }: Service, key: string): Promise<ClubState> {
  const named = (await store.listClubs()).find((club) => club.key === key);
  const club = named === undefined ? null : await store.people.findClub(named.id);
  if (club?.facts.publicDashboard === true) return club;
  throw new Problem('not-found', { detail: 'No club of this key shows its dashboard.' });
}
