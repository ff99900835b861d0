import { changeWeeklyDigestSchema, digestStopSchema } from '@/shared/contract/weekly-digest';
import { notFound } from '../errors/domain-error';
import {
  askPage,
  changeWeeklyDigest,
  isDigestLink,
  stopDigestByLink,
  stoppedPage,
  weeklyDigest,
} from '../services/waits/digest.service';
import type { Policy, RoutesModule } from './define-route';

const policy: Policy = { kind: 'capability', capability: 'workshop:write' };
/** By the link of a letter, in a mail program or a browser that is not signed in. */
const open: Policy = { kind: 'public' };

export const digestRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/me/weekly-digest',
    policy,
    handle: ({ deps, member }) => weeklyDigest(deps, member),
  });
  route({
    method: 'patch',
    path: '/me/weekly-digest',
    policy,
    body: changeWeeklyDigestSchema,
    handle: ({ deps, member, body, now }) => changeWeeklyDigest(deps, member, body, now),
  });
  route({
    method: 'get',
    path: '/digest/stop',
    policy: open,
    limit: 'open',
    query: digestStopSchema,
    handle: async ({ deps, query, response }) => {
      if (!isDigestLink(deps, query.token)) throw notFound('This link');
      response.type('html').send(askPage(query.token));
    },
  });
  route({
    method: 'post',
    path: '/digest/stop',
    policy: open,
    limit: 'open',
    query: digestStopSchema,
    handle: async ({ deps, query, now, response }) => {
      await stopDigestByLink(deps, query.token, now);
      response.type('html').send(stoppedPage);
    },
  });
};
