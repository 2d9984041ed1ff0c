import { getChains, getVerification, startVerification } from '@/shared/contracts/chain';
import { route } from '../middleware/route';
import * as chains from '../services/chains';

export const chainRoutes = [
  route(getChains, ({ actor }) => chains.readChains(actor.desk)),
  route(startVerification, ({ actor, body, writeOnce }) =>
    chains.startVerification(actor, body, writeOnce),
  ),
  route(getVerification, ({ actor, params }) =>
    chains.readVerification(actor.desk, params.verificationId),
  ),
];
