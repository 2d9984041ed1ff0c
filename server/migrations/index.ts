import { roles } from './0001-roles';
import { people } from './0002-people';
import { market } from './0003-market';
import { quotes } from './0004-quotes';
import { chain } from './0010-chain';
import { trades } from './0011-trades';
import { marketData } from './0012-market-data';
import { studies } from './0014-studies';
import { exportFiles } from './0015-exports';
import { runs } from './0016-runs';
import type { Migration } from './migration';

/** Every migration, oldest first. Listed by hand, so that the bundled server carries them. */
export const migrations: readonly Migration[] = [
  roles,
  people,
  market,
  quotes,
  chain,
  trades,
  marketData,
  studies,
  exportFiles,
  runs,
];
