import { addDemoPhone, mailbox } from '../services/demo-mailbox.service';
import type { RoutesModule } from './define-route';

/** What only the demo has: without it these addresses do not exist. */
export const demoRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/demo/mailbox',
    policy: { kind: 'member' },
    demoOnly: true,
    handle: ({ deps, member }) => mailbox(deps, member),
  });
  route({
    method: 'post',
    path: '/demo/phone',
    policy: { kind: 'member' },
    demoOnly: true,
    handle: ({ deps, member, now }) => addDemoPhone(deps, member, now),
  });
};
