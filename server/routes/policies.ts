import { approvePolicy, createPolicy, listPolicies, savePolicy } from '@/shared/contracts/policies';
import { route } from '../middleware/route';
import * as policies from '../services/policies';

export const policyRoutes = [
  route(listPolicies, async ({ actor }) => ({
    policies: await policies.listPolicies(actor.desk),
  })),
  route(createPolicy, ({ actor, body, writeOnce }) =>
    policies.createPolicy(actor, body, writeOnce),
  ),
  route(savePolicy, ({ actor, params, body }) => policies.savePolicy(actor, params.policyId, body)),
  route(approvePolicy, ({ actor, params, body }) =>
    policies.approvePolicy(actor, params.policyId, body.version),
  ),
];
