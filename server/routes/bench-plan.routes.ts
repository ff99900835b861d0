import * as z from 'zod/mini';
import { acceptProposalSchema, benchPlanQuerySchema, moveChargeSchema } from '@/shared/contract/bench-plan';
import { day, id } from '@/shared/contract/common';
import { paperQuerySchema } from '@/shared/contract/papers';
import { benchPlan, myDay } from '../services/bench-plan/bench-plan.service';
import { daySheetPaper } from '../services/bench-plan/day-sheet-paper.service';
import { fits } from '../services/bench-plan/fits.service';
import { moveCharge, movePlaces } from '../services/bench-plan/moves.service';
import { acceptProposal, proposal } from '../services/bench-plan/proposal.service';
import { startNow } from '../services/bench-plan/start-now.service';
import { undoBenchChange } from '../services/bench-plan/undo.service';
import type { Policy, RoutesModule } from './define-route';
import { sendPaper } from './send-paper';

const plan: Policy = { kind: 'capability', capability: 'bench:plan' };
const read: Policy = { kind: 'capability', capability: 'work:read' };
const chargePlan: Policy = { kind: 'capability', capability: 'charge:plan' };

const dayQuery = z.object({ day: z.optional(day) });
const daySheetQuery = z.object({ ...paperQuerySchema.shape, day: z.optional(day) });

export const benchPlanRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/bench-plan',
    policy: plan,
    query: benchPlanQuerySchema,
    handle: ({ deps, member, query, now }) => benchPlan(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/bench-plan/proposal',
    policy: plan,
    // Nothing better is no content.
    handle: async ({ deps, member, now }) => (await proposal(deps, member, now)) ?? undefined,
  });
  route({
    method: 'post',
    path: '/bench-plan/accept',
    policy: plan,
    body: acceptProposalSchema,
    idempotent: true,
    handle: ({ deps, member, body, now }) => acceptProposal(deps, member, body.proposalId, now),
  });
  route({
    method: 'post',
    path: '/bench-plan/move',
    policy: plan,
    body: moveChargeSchema,
    idempotent: true,
    handle: ({ deps, member, body, now }) => moveCharge(deps, member, body, now),
  });
  route({
    method: 'post',
    path: '/bench-plan/undo/:id',
    policy: plan,
    idempotent: true,
    handle: ({ deps, member, params, now }) => undoBenchChange(deps, member, params.id ?? '', now),
  });
  route({
    method: 'get',
    path: '/bench-plan/places',
    policy: plan,
    query: z.object({ chargeId: id }),
    handle: ({ deps, member, query, now }) => movePlaces(deps, member, query.chargeId, now),
  });
  route({
    method: 'get',
    path: '/bench-plan/fits',
    policy: read,
    handle: ({ deps, member, now }) => fits(deps, member, now),
  });
  route({
    method: 'get',
    path: '/bench-plan/my-day',
    policy: read,
    query: dayQuery,
    handle: ({ deps, member, query, now }) => myDay(deps, member, query.day, now),
  });
  route({
    method: 'get',
    path: '/bench-plan/start-now',
    policy: chargePlan,
    handle: ({ deps, member, now }) => startNow(deps, member, now),
  });
  route({
    method: 'get',
    path: '/bench-plan/day-sheet.pdf',
    policy: read,
    query: daySheetQuery,
    limit: 'papers',
    handle: async ({ deps, member, query, response, now }) =>
      sendPaper(response, await daySheetPaper(deps, member, query, now)),
  });
};
