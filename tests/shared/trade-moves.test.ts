/** The table of moves as it was agreed: common practice of four eyes, no source. */
import { permissions, type Permission } from '@/shared/permissions';
import {
  mayEnd,
  moveRefusal,
  moveRow,
  moveTarget,
  tradeMoves,
  tradeStatuses,
  type TradeMove,
  type TradeStatus,
} from '@/shared/trade-moves';

type Row = Record<TradeStatus | 'none', string>;

/** Where each move leads from each status; empty where it is refused. */
const golden: Record<TradeMove, Partial<Row>> = {
  propose: { none: 'proposed' },
  amend: { proposed: 'proposed', returned: 'proposed', live: 'amended', amended: 'amended' },
  approve: { proposed: 'live', amended: 'live' },
  return: { proposed: 'returned', amended: 'live' },
  close: { live: 'closed' },
  expire: { live: 'expired', amended: 'expired' },
};

const neverOwn: TradeMove[] = ['approve', 'return', 'close'];
const ofTheHead: TradeMove[] = ['approve', 'return', 'close'];

test('every move is in the agreed table', () => {
  expect(tradeMoves.sort()).toEqual(Object.keys(golden).sort());
});

describe.each(tradeMoves)('%s', (move) => {
  test.each([null, ...tradeStatuses])('from %s', (from) => {
    expect(moveTarget(move, from)).toBe(golden[move][from ?? 'none'] ?? null);
  });

  test('needs its permission, and someone else where four eyes are asked for', () => {
    const row = moveRow(move);
    expect(row.permission).toBe(ofTheHead.includes(move) ? 'approve-trades' : 'propose-trades');
    expect(row.neverOwn).toBe(neverOwn.includes(move));
  });
});

test('nothing leads out of a trade that has ended', () => {
  for (const move of tradeMoves)
    expect([moveTarget(move, 'closed'), moveTarget(move, 'expired')]).toEqual([null, null]);
});

describe('who may', () => {
  const makers = { proposedById: 'ada', lastAmendedById: 'ben' };
  const trade = (status: TradeStatus) => ({ status, makers });
  const holding = (userId: string, held: readonly Permission[] = permissions) => ({
    userId,
    permissions: held,
  });

  test.each(['ada', 'ben'])('not approve what they made: %s', (userId) => {
    for (const move of ['approve', 'return'] as const)
      expect(moveRefusal(move, trade('amended'), holding(userId))).toBe('own-trade');
    expect(moveRefusal('amend', trade('amended'), holding(userId))).toBeNull();
  });

  test('approve what others made', () => {
    expect(moveRefusal('approve', trade('proposed'), holding('cleo'))).toBeNull();
  });

  test('nothing without the permission, whatever the status', () => {
    for (const move of tradeMoves)
      for (const status of tradeStatuses)
        expect(moveRefusal(move, trade(status), holding('cleo', ['read-desk']))).toBe(
          'not-permitted',
        );
  });

  test('nothing from where the table has no step', () => {
    expect(moveRefusal('approve', trade('live'), holding('cleo'))).toBe('not-from-here');
    expect(moveRefusal('close', trade('amended'), holding('cleo'))).toBe('not-from-here');
  });
});

test.each([
  ['lapsed', 'european', 999, false],
  ['lapsed', 'american', 999, false],
  ['exercised', 'european', 999, false],
  ['exercised', 'american', 999, true],
  ['lapsed', 'european', 1000, true],
  ['exercised', 'european', 1000, true],
] as const)('%s, %s, at %i of 1000: %s', (outcome, exercise, now, allowed) => {
  expect(mayEnd(outcome, exercise, 1000, now)).toBe(allowed);
});
