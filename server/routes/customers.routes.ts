import { eraseCustomerSchema } from '@/shared/contract/customer';
import { eraseCustomer, exportCustomer } from '../services/customers.service';
import type { Policy, RoutesModule } from './define-route';

const policy: Policy = { kind: 'capability', capability: 'customer:data' };

export const customersRoutes: RoutesModule = (route) => {
  route({
    method: 'get',
    path: '/repairs/:id/customer.json',
    policy,
    handle: async ({ deps, member, params, now, response }) => {
      const data = await exportCustomer(deps, member, params.id!, now);
      // No name in the file's name: it ends up in lists of downloads.
      response
        .attachment('customer-data.json')
        .type('json')
        .send(JSON.stringify(data, null, 2));
    },
  });
  route({
    method: 'post',
    path: '/repairs/:id/customer/erase',
    policy,
    body: eraseCustomerSchema,
    handle: ({ deps, member, params, body, now }) => eraseCustomer(deps, member, params.id!, body, now),
  });
};
