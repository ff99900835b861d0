import { pipeline } from 'node:stream/promises';
import { packTypeSchema } from '@/shared/contract/pack';
import {
  decideSourceSchema,
  packReadingSchema,
  secondSourceSchema,
  setReadingAsideSchema,
  takeTargetSchema,
} from '@/shared/contract/pack-reading';
import { paperQuerySchema } from '@/shared/contract/papers';
import {
  advisedSchema,
  archiveRepairSchema,
  changeRepairSchema,
  correctWaitSchema,
  deleteRepairSchema,
  fitAsItIsSchema,
  handOverRepairSchema,
  removedModuleSchema,
  repairSchema,
  repairsQuerySchema,
  reserveSpareSchema,
} from '@/shared/contract/repair';
import { addAdvised, changeAdvised, removeAdvised } from '../services/advised.service';
import { candidates } from '../services/candidates.service';
import { correctWait } from '../services/correct-wait.service';
import {
  archiveRepair,
  deleteRepair,
  handOverRepair,
  recordRemoved,
  restoreRepair,
} from '../services/finish-repair.service';
import { handOverPaper } from '../services/hand-over-paper.service';
import { addPackReading, setReadingAside } from '../services/pack-readings.service';
import { addPackType, changePackType, packTypes } from '../services/pack-types.service';
import { fitAsItIs } from '../services/repair-fits.service';
import { freeSpare, reserveSpare } from '../services/repair-spares.service';
import { takeTarget } from '../services/repair-targets.service';
import { repairSeason } from '../services/repair-season.service';
import { repairsCsv } from '../services/repairs-csv.service';
import { addRepair, changeBooked, repair, repairs } from '../services/repairs.service';
import { addSecondSource, decideSource } from '../services/second-sources.service';
import type { Policy, RoutesModule } from './define-route';
import { sendPaper } from './send-paper';

const read: Policy = { kind: 'capability', capability: 'repair:read' };
const write: Policy = { kind: 'capability', capability: 'repair:write' };
const decide: Policy = { kind: 'capability', capability: 'repair:decide' };
const remove: Policy = { kind: 'capability', capability: 'repair:delete' };
const exporting: Policy = { kind: 'capability', capability: 'repair:export' };
const equipment: Policy = { kind: 'capability', capability: 'equipment:write' };

const idOf = (params: Record<string, string>): string => params.id ?? '';

export const repairsRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/pack-types',
    policy: read,
    handle: ({ deps, member }) => packTypes(deps, member),
  });
  route({
    method: 'post',
    path: '/pack-types',
    policy: equipment,
    body: packTypeSchema,
    status: 201,
    handle: ({ deps, member, body, now }) => addPackType(deps, member, body, now),
  });
  route({
    method: 'patch',
    path: '/pack-types/:id',
    policy: equipment,
    body: packTypeSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changePackType(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'get',
    path: '/repairs',
    policy: read,
    query: repairsQuerySchema,
    handle: ({ deps, member, query, now }) => repairs(deps, member, query, now),
  });
  route({
    method: 'get',
    path: '/repairs.csv',
    policy: exporting,
    query: repairsQuerySchema,
    handle: async ({ deps, member, query, now, response }) => {
      const file = await repairsCsv(deps, member, query, now);
      response.attachment(file.name).type('text/csv; charset=utf-8');
      await pipeline(file.lines, response);
    },
  });
  route({
    method: 'get',
    path: '/repairs/:id/season',
    policy: read,
    handle: ({ deps, member, params, now }) => repairSeason(deps, member, idOf(params), now),
  });
  route({
    method: 'post',
    path: '/repairs',
    policy: write,
    body: repairSchema,
    idempotent: true,
    status: 201,
    handle: ({ deps, member, body, now }) => addRepair(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/repairs/:id',
    policy: read,
    handle: ({ deps, member, params, now }) => repair(deps, member, idOf(params), now),
  });
  route({
    method: 'patch',
    path: '/repairs/:id',
    policy: write,
    body: changeRepairSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => changeBooked(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/readings',
    policy: write,
    body: packReadingSchema,
    idempotent: true,
    status: 201,
    handle: ({ deps, member, params, body, now }) => addPackReading(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/readings/:readingId/set-aside',
    policy: write,
    body: setReadingAsideSchema,
    handle: ({ deps, member, params, body, now }) =>
      setReadingAside(deps, member, idOf(params), params.readingId ?? '', body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/second-source',
    policy: write,
    body: secondSourceSchema,
    idempotent: true,
    status: 201,
    handle: ({ deps, member, params, body, now }) => addSecondSource(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/second-source/:sourceId/decision',
    policy: decide,
    body: decideSourceSchema,
    handle: ({ deps, member, params, body, now }) =>
      decideSource(deps, member, idOf(params), params.sourceId ?? '', body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/target',
    policy: write,
    body: takeTargetSchema,
    handle: ({ deps, member, params, body, now }) => takeTarget(deps, member, idOf(params), body, now),
  });
  route({
    method: 'get',
    path: '/repairs/:id/candidates',
    policy: read,
    handle: ({ deps, member, params, now }) => candidates(deps, member, idOf(params), now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/spare',
    policy: write,
    body: reserveSpareSchema,
    handle: ({ deps, member, params, body, now }) => reserveSpare(deps, member, idOf(params), body, now),
  });
  route({
    method: 'delete',
    path: '/repairs/:id/spare',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) => freeSpare(deps, member, idOf(params), rev, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/fit',
    policy: write,
    body: fitAsItIsSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) => fitAsItIs(deps, member, idOf(params), rev, body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/removed',
    policy: write,
    body: removedModuleSchema,
    status: 201,
    handle: ({ deps, member, params, body, now }) => recordRemoved(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/advised',
    policy: write,
    body: advisedSchema,
    status: 201,
    handle: ({ deps, member, params, body, now }) => addAdvised(deps, member, idOf(params), body, now),
  });
  route({
    method: 'patch',
    path: '/repairs/:id/advised/:itemId',
    policy: write,
    body: advisedSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) =>
      changeAdvised(deps, member, { repairId: idOf(params), itemId: params.itemId ?? '' }, rev, body, now),
  });
  route({
    method: 'delete',
    path: '/repairs/:id/advised/:itemId',
    policy: write,
    ifMatch: true,
    handle: ({ deps, member, params, rev, now }) =>
      removeAdvised(deps, member, { repairId: idOf(params), itemId: params.itemId ?? '' }, rev, now),
  });
  route({
    method: 'get',
    path: '/repairs/:id/hand-over.pdf',
    policy: read,
    query: paperQuerySchema,
    limit: 'papers',
    handle: async ({ deps, member, params, query, response }) =>
      sendPaper(response, await handOverPaper(deps, member, idOf(params), query)),
  });
  route({
    method: 'post',
    path: '/repairs/:id/hand-over',
    policy: write,
    body: handOverRepairSchema,
    handle: ({ deps, member, params, body, now }) => handOverRepair(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/archive',
    policy: write,
    body: archiveRepairSchema,
    handle: ({ deps, member, params, body, now }) => archiveRepair(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/delete',
    policy: remove,
    body: deleteRepairSchema,
    handle: ({ deps, member, params, body, now }) => deleteRepair(deps, member, idOf(params), body, now),
  });
  route({
    method: 'post',
    path: '/repairs/:id/restore',
    policy: remove,
    handle: ({ deps, member, params, now }) => restoreRepair(deps, member, idOf(params), now),
  });
  route({
    method: 'patch',
    path: '/repairs/:id/wait/:waitId',
    policy: write,
    body: correctWaitSchema,
    ifMatch: true,
    handle: ({ deps, member, params, rev, body, now }) =>
      correctWait(deps, member, { repairId: idOf(params), waitId: params.waitId ?? '' }, rev, body, now),
  });
};
