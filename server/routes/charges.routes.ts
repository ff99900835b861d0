import {
  answerCheckSchema,
  chargesQuerySchema,
  correctReadingSchema,
  currentOffSchema,
  fitSchema,
  handOverSchema,
  holdSchema,
  lookInSchema,
  nextStepSchema,
  queueChargeSchema,
  readingSchema,
  restCheckSchema,
  resumeSchema,
  shelveSchema,
  startChargeSchema,
  stopSchema,
} from '@/shared/contract/charge';
import { logQuerySchema } from '@/shared/contract/charge-log';
import { paperQuerySchema } from '@/shared/contract/papers';
import { keepPlanSchema } from '@/shared/contract/plan';
import { previewLog, takeLog } from '../services/charge-log/charge-log.service';
import { correctReading, logReading } from '../services/charge-readings.service';
import { charge, charges } from '../services/charges.service';
import { checkAfterRest, fitCharge, handOver, shelveCharge } from '../services/finish-charge.service';
import { keepPlan } from '../services/keep-plan.service';
import { labelPaper } from '../services/label-paper.service';
import { lookIn } from '../services/look-ins.service';
import { answerCheck, dropCharge, queueCharge } from '../services/prepare-charge.service';
import { currentOff, holdCharge, nextStep, resumeCharge, stopCharge } from '../services/run-charge.service';
import { startCharge } from '../services/start-charge.service';
import type { Policy, RoutesModule } from './define-route';
import { sendPaper } from './send-paper';

const read: Policy = { kind: 'capability', capability: 'board:read' };
const plan: Policy = { kind: 'capability', capability: 'charge:plan' };
const run: Policy = { kind: 'capability', capability: 'charge:run' };

/** Path parameters that the route's own path names. */
const idOf = (params: Record<string, string>): string => params.id ?? '';

export const chargesRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/charges',
    policy: read,
    query: chargesQuerySchema,
    handle: ({ deps, member, query, now }) => charges(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/charges/:id',
    policy: read,
    handle: ({ deps, member, params, now }) => charge(deps, member, idOf(params), now),
  });
  route({
    method: 'get',
    path: '/charges/:id/label.pdf',
    policy: read,
    query: paperQuerySchema,
    limit: 'papers',
    handle: async ({ deps, member, params, query, request, response, now }) =>
      sendPaper(
        response,
        await labelPaper(deps, member, idOf(params), query, `${request.protocol}://${request.host}`, now),
      ),
  });
  route({
    method: 'post',
    path: '/charges',
    policy: plan,
    body: keepPlanSchema,
    idempotent: true,
    status: 201,
    handle: ({ deps, member, body, now }) => keepPlan(deps, member, body, now),
  });
  route({
    method: 'delete',
    path: '/charges/:id',
    policy: plan,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => dropCharge(deps, member, idOf(params), rev, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/checks',
    policy: run,
    body: answerCheckSchema,
    idempotent: true,
    handle: ({ deps, member, params, body, now }) => answerCheck(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/queue',
    policy: plan,
    body: queueChargeSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => queueCharge(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/start',
    policy: run,
    body: startChargeSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => startCharge(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/hold',
    policy: run,
    body: holdSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => holdCharge(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/resume',
    policy: run,
    body: resumeSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => resumeCharge(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/stop',
    policy: run,
    body: stopSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => stopCharge(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/current-off',
    policy: run,
    body: currentOffSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => currentOff(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/next-step',
    policy: run,
    body: nextStepSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => nextStep(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/readings',
    policy: run,
    body: readingSchema,
    idempotent: true,
    handle: ({ deps, member, params, body, now }) => logReading(deps, member, idOf(params), body, now),
  });
  route({
    method: 'patch',
    path: '/charges/:id/readings/:readingId',
    policy: run,
    body: correctReadingSchema,
    handle: ({ deps, member, params, body, now }) =>
      correctReading(deps, member, idOf(params), params.readingId ?? '', body, now),
  });
  // The file is the body itself, read as it comes in. The same one twice adds nothing, so that it needs no key.
  route({
    method: 'post',
    path: '/charges/:id/log-preview',
    policy: run,
    query: logQuerySchema,
    limit: 'logFile',
    handle: ({ deps, member, params, query, request, now }) =>
      previewLog(deps, member, idOf(params), query, request, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/log-file',
    policy: run,
    query: logQuerySchema,
    limit: 'logFile',
    handle: ({ deps, member, params, query, request, now }) => takeLog(deps, member, idOf(params), query, request, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/look-ins',
    policy: run,
    body: lookInSchema,
    idempotent: true,
    handle: ({ deps, member, params, body, now }) => lookIn(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/hand-over',
    policy: run,
    body: handOverSchema,
    ifMatch: true,
    handle: ({ deps, member, params, body, rev, now }) => handOver(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/rest-check',
    policy: run,
    body: restCheckSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => checkAfterRest(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/fit',
    policy: run,
    body: fitSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => fitCharge(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/charges/:id/shelve',
    policy: run,
    body: shelveSchema,
    ifMatch: true,
    idempotent: true,
    handle: ({ deps, member, params, body, rev, now }) => shelveCharge(deps, member, idOf(params), rev, body, now),
  });
};
