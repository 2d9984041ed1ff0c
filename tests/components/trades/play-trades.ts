/** An invented trade, and a server that answers for it. */
import type { Book } from '@/shared/contracts/books';
import type { DeskAccess } from '@/shared/contracts/sessions';
import type { Trade, TradeVersion } from '@/shared/contracts/trades';
import { effectivePermissions, type DeskRole } from '@/shared/permissions';
import { desk, wheat } from '../../hooks/ticket-examples';

const person = (digit: number, name: string) => ({
  id: `00000000-0000-4000-8000-00000000000${digit}`,
  name,
});

export const ada = person(1, 'Ada');
export const ben = person(2, 'Ben');
export const cleo = person(3, 'Cleo');

export const deskOf = (role: DeskRole): DeskAccess => ({
  ...desk,
  role,
  permissions: effectivePermissions(role, []),
});

export const book: Book = {
  id: '66666666-6666-4666-8666-666666666661',
  code: 'GRAIN',
  name: 'Grain and oilseed',
  live: 1,
  waiting: 1,
  returned: 0,
  ended: 0,
  doubtful: 0,
  unvalued: 0,
};

export const version = (fields: Partial<TradeVersion> = {}): TradeVersion => ({
  id: '77777777-7777-4777-8777-777777777771',
  number: 1,
  state: 'proposed',
  direction: 'sell',
  quantity: '10',
  contractSize: '50',
  kind: 'put',
  exercise: 'american',
  strike: '210',
  expiryDate: '2027-06-01',
  expiryAt: '2027-06-01T15:30:00.000Z',
  counterparty: 'Grenmoor Mills',
  premiumAmount: '6750',
  premiumCurrency: 'EUR',
  premiumDate: '2026-12-03',
  tradedAt: '2026-12-01T09:05:42.000Z',
  note: '',
  quoteId: null,
  amendmentReason: null,
  proposedBy: ada,
  proposedAt: '2026-12-01T09:10:00.000Z',
  decidedBy: null,
  decidedAt: null,
  decisionReason: null,
  ...fields,
});

export function tradeWith(versions: TradeVersion[], fields: Partial<Trade> = {}): Trade {
  const live = versions.find(({ state }) => state === 'approved');
  const shown = live ?? versions[0];
  return {
    id: '88888888-8888-4888-8888-888888888881',
    number: 'T-0001',
    status: 'proposed',
    book: { id: book.id, code: book.code, name: book.name },
    underlying: wheat,
    direction: shown.direction,
    quantity: shown.quantity,
    contractSize: shown.contractSize,
    kind: shown.kind,
    exercise: shown.exercise,
    strike: shown.strike,
    expiryDate: shown.expiryDate,
    expiryAt: shown.expiryAt,
    counterparty: shown.counterparty,
    proposedBy: ada,
    proposedAt: '2026-12-01T09:10:00.000Z',
    lastValuation: null,
    version: 4,
    liveVersionId: live?.id ?? null,
    latestVersionId: versions[0].id,
    versions,
    events: [
      {
        position: 7,
        event: 'proposed',
        at: '2026-12-01T09:10:00.123Z',
        by: ada,
        versionNumber: 1,
        reason: null,
      },
    ],
    end: null,
    ...fields,
  };
}

export const amended = () =>
  tradeWith(
    [
      version({
        id: '77777777-7777-4777-8777-777777777772',
        number: 2,
        quantity: '12',
        amendmentReason: 'Two more lots by phone',
        proposedBy: ben,
      }),
      version({ state: 'approved', decidedBy: cleo, decidedAt: '2026-12-01T09:20:00.000Z' }),
    ],
    { status: 'amended' },
  );

export type Sent = { method: string; path: string; body: Record<string, unknown>; key: string };

type Reply = { status: number; body: unknown };

export const problem = (status: number, code: string, issues: object[] = []): Reply => ({
  status,
  body: { type: 'about:blank', title: code, status, code, requestId: 'r1', issues },
});

/** Answers what is read from the paths' ends, and hands over what is sent. */
export function playServer(
  read: () => Record<string, unknown>,
  answer: (sent: Sent) => Reply | 'away',
): Sent[] {
  const all: Sent[] = [];
  const reply = ({ status, body }: Reply) =>
    Promise.resolve({ ok: status < 400, status, json: () => Promise.resolve(body) });
  const fetch = (url: string, init: RequestInit) => {
    if (init.method === 'GET') {
      const [path] = url.split('?');
      const found = Object.entries(read()).find(([end]) => path.endsWith(end));
      return reply(found ? { status: 200, body: found[1] } : problem(404, 'not-found'));
    }
    const sent = {
      method: init.method ?? '',
      path: url.split(`${desk.id}/`)[1],
      body: JSON.parse(String(init.body)) as Record<string, unknown>,
      key: new Headers(init.headers).get('idempotency-key') ?? '',
    };
    all.push(sent);
    const answered = answer(sent);
    return answered === 'away' ? Promise.reject(new TypeError('Failed to fetch')) : reply(answered);
  };
  Object.assign(globalThis, { fetch });
  return all;
}
