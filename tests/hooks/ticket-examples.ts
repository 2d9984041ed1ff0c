/** Invented underlyings and a desk for tests of the ticket. */
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Underlying } from '@/shared/contracts/underlyings';

const snapshotId = '44444444-4444-4444-8444-444444444444';

export const wheat: Underlying = {
  id: '33333333-3333-4333-8333-333333333331',
  symbol: 'WHT-Z',
  name: 'Winter wheat, December',
  kind: 'future',
  currency: 'EUR',
  unit: 't',
  contractSize: '500.0000000000',
  priceDecimals: 2,
  tolerance: 0.001,
  moneyTolerance: null,
  close: {
    snapshotId,
    date: '2026-11-30',
    market: { spot: 212.4, rate: 0.03, volatility: 0.245, carry: 'future' },
  },
};

export const share: Underlying = {
  id: '33333333-3333-4333-8333-333333333332',
  symbol: 'MILL',
  name: 'Mill share',
  kind: 'share',
  currency: 'EUR',
  unit: 'share',
  contractSize: '100',
  priceDecimals: 2,
  tolerance: 0.001,
  moneyTolerance: null,
  close: {
    snapshotId,
    date: '2026-11-30',
    market: { spot: 48.12, rate: 0.03, volatility: 0.31, yield: 0.022 },
  },
};

export const withoutClose: Underlying = {
  ...share,
  id: '33333333-3333-4333-8333-333333333333',
  symbol: 'BARLEY',
  name: 'Barley',
  close: null,
};

export const desk: DeskAccess = {
  id: '11111111-1111-4111-8111-111111111111',
  name: 'Commodities',
  timeZone: 'Europe/Berlin',
  expiryCutoff: '17:30',
  role: 'analyst',
  suspended: false,
  permissions: ['price', 'read-desk'],
};
