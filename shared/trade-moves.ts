/**
 * The one table of what may happen to a trade: each act with the statuses that it leads from and
 * to, the permission it needs, and whether it must be someone else's than the people who brought
 * the waiting terms about. The server obeys it, and screens offer only what it allows.
 */
import type { Permission } from './permissions';

/** `amended`: live as approved, with a new version that waits. */
export const tradeStatuses = [
  'proposed',
  'returned',
  'live',
  'amended',
  'closed',
  'expired',
] as const;
export type TradeStatus = (typeof tradeStatuses)[number];

type MoveRow = {
  permission: Permission;
  neverOwn: boolean;
  /** From which status to which; a trade that is proposed had none before. */
  steps: readonly (readonly [from: TradeStatus | null, to: TradeStatus])[];
};

const moveTable = {
  propose: {
    permission: 'propose-trades',
    neverOwn: false,
    steps: [[null, 'proposed']],
  },
  amend: {
    permission: 'propose-trades',
    neverOwn: false,
    steps: [
      ['proposed', 'proposed'],
      ['returned', 'proposed'],
      ['live', 'amended'],
      ['amended', 'amended'],
    ],
  },
  approve: {
    permission: 'approve-trades',
    neverOwn: true,
    steps: [
      ['proposed', 'live'],
      ['amended', 'live'],
    ],
  },
  return: {
    permission: 'approve-trades',
    neverOwn: true,
    steps: [
      ['proposed', 'returned'],
      ['amended', 'live'],
    ],
  },
  close: {
    permission: 'approve-trades',
    neverOwn: true,
    steps: [['live', 'closed']],
  },
  expire: {
    permission: 'propose-trades',
    neverOwn: false,
    steps: [
      ['live', 'expired'],
      ['amended', 'expired'],
    ],
  },
} as const satisfies Record<string, MoveRow>;

export type TradeMove = keyof typeof moveTable;
export const tradeMoves = Object.keys(moveTable) as TradeMove[];

export const moveRow = (move: TradeMove): MoveRow => moveTable[move];

/** Where the move leads from here; null where it cannot be made. */
export function moveTarget(move: TradeMove, from: TradeStatus | null): TradeStatus | null {
  const step = moveRow(move).steps.find(([start]) => start === from);
  return step ? step[1] : null;
}

/** Whoever proposed the trade, and whoever amended it last. */
export type TradeMakers = { proposedById: string; lastAmendedById: string };

export const isMaker = (userId: string, makers: TradeMakers): boolean =>
  userId === makers.proposedById || userId === makers.lastAmendedById;

export type MoveRefusal = 'not-permitted' | 'own-trade' | 'not-from-here';

/** Why someone may not make the move now; null when they may. */
export function moveRefusal(
  move: TradeMove,
  trade: { status: TradeStatus; makers: TradeMakers },
  who: { userId: string; permissions: readonly Permission[] },
): MoveRefusal | null {
  const { permission, neverOwn } = moveRow(move);
  if (!who.permissions.includes(permission)) return 'not-permitted';
  if (moveTarget(move, trade.status) === null) return 'not-from-here';
  return neverOwn && isMaker(who.userId, trade.makers) ? 'own-trade' : null;
}

/** Statuses that wait for someone's approval. */
export const waitingStatuses = ['proposed', 'amended'] as const satisfies readonly TradeStatus[];

/** Statuses in which approved terms are in force. */
export const liveStatuses = ['live', 'amended'] as const satisfies readonly TradeStatus[];

const among = (statuses: readonly TradeStatus[], status: TradeStatus) => statuses.includes(status);

export const isWaiting = (status: TradeStatus): boolean => among(waitingStatuses, status);
export const isLive = (status: TradeStatus): boolean => among(liveStatuses, status);

export type ExpiryOutcome = 'lapsed' | 'exercised';

/** An American option may be exercised before its end; nothing lapses before it. */
export const mayEnd = (
  outcome: ExpiryOutcome,
  exercise: 'european' | 'american',
  expiryAtMs: number,
  nowMs: number,
): boolean => nowMs >= expiryAtMs || (outcome === 'exercised' && exercise === 'american');
