/** An invented run of four trades with an exception of each gravity, as the server would send it. */
import type { MethodName } from '@/pricing/contract';
import type { Route } from '@/shared/contracts/pricing';
import type { ExceptionalValuation, Run, RunValuation } from '@/shared/contracts/runs';
import { wheat } from '../../hooks/ticket-examples';
import { ada, ben, book } from '../trades/play-trades';

export const runId = '99999999-9999-4999-8999-999999999901';

const bookName = { id: book.id, code: book.code, name: book.name };

export const finishedRun: Run = {
  id: runId,
  number: 'R-0007',
  status: 'finished',
  version: 12,
  snapshot: { id: '44444444-4444-4444-8444-444444444444', date: '2026-11-30' },
  policy: { id: '55555555-5555-4555-8555-555555555555', number: 3 },
  books: [bookName],
  valuedAt: '2026-11-30T16:30:00.000Z',
  total: 4,
  done: 4,
  leftOut: 1,
  counts: { agree: 2, wide: 0, disagree: 1, oneRoute: 0, failed: 1, refuted: 0 },
  exceptions: 2,
  openExceptions: 2,
  rerunOf: null,
  startedBy: ada,
  startedAt: '2026-12-01T07:00:00.000Z',
  finishedAt: '2026-12-01T07:00:09.000Z',
  cancellation: null,
  signOff: null,
  engine: '1.0.0',
  reruns: [],
  before: { id: '99999999-9999-4999-8999-999999999900', number: 'R-0006', date: '2026-11-27' },
  totals: [{ currency: 'EUR', total: '-6617.15', before: '-6559.15', change: '-58' }],
  makerIds: [ada.id],
};

export const runningRun: Run = {
  ...finishedRun,
  status: 'running',
  done: 1,
  counts: { agree: 1, wide: 0, disagree: 0, oneRoute: 0, failed: 0, refuted: 0 },
  exceptions: 0,
  openExceptions: 0,
  finishedAt: null,
  totals: [],
};

const greeks = { delta: -0.4, gamma: 0.01, vega: 40, theta: -8, rho: -30, yieldRho: null };

const found = (name: MethodName, value: number, errorEstimate: number): Route => ({
  name,
  result: {
    ok: true,
    value,
    errorEstimate,
    greeks,
    method: { name },
    diagnostics: {},
    warnings: [],
  },
});

const failed = (name: MethodName): Route => ({
  name,
  result: { ok: false, code: 'tolerance-not-reached', path: 'method', message: 'Give more steps.' },
});

const strip = (routes: readonly Route[]) =>
  routes.flatMap(({ name, result }) =>
    result.ok ? [{ name, value: result.value, errorEstimate: result.errorEstimate }] : [],
  );

function valuation(digit: number, primary: Route, check: Route): RunValuation {
  return {
    position: 100 + digit,
    trade: { id: `88888888-8888-4888-8888-88888888888${digit}`, number: `T-000${digit}` },
    tradeVersionId: `77777777-7777-4777-8777-77777777777${digit}`,
    book: bookName,
    underlying: wheat,
    terms: {
      direction: 'sell',
      quantity: '10',
      contractSize: '50',
      kind: 'put',
      exercise: 'american',
      strike: '210',
      expiryDate: '2027-06-01',
    },
    primary,
    check,
    tolerance: 0.001,
    verdict: 'agree',
    refuted: false,
    strip: strip([primary, check]),
    total: primary.result.ok ? '-6617.15' : null,
    before: {
      run: { id: '99999999-9999-4999-8999-999999999900', number: 'R-0006' },
      valuedAt: '2026-11-27T16:30:00.000Z',
      value: 13.1183,
    },
    change: primary.result.ok ? 0.116 : null,
    exception: null,
  };
}

const grid = 'heat-crank-nicolson';
const walk = 'lattice-symmetric';

export const agreeing = valuation(3, found(grid, 13.2343, 0.0002), found(walk, 13.2345, 0.0003));

/** Differs by 0.0100 on 500 units. */
export const disagreeing: ExceptionalValuation = {
  ...valuation(1, found(grid, 13.2343, 0.0002), found(walk, 13.2443, 0.0003)),
  verdict: 'disagree',
  exception: {
    id: 'aaaaaaaa-aaaa-4aaa-8aaa-aaaaaaaaaaa1',
    kind: 'disagree',
    state: 'open',
    materiality: '5',
    makerIds: [ada.id],
    answer: null,
  },
};

export const withoutValue: ExceptionalValuation = {
  ...valuation(2, failed(grid), found(walk, 13.2443, 0.0003)),
  verdict: 'one-route',
  exception: {
    id: 'aaaaaaaa-aaaa-4aaa-8aaa-aaaaaaaaaaa2',
    kind: 'failure',
    state: 'open',
    materiality: null,
    makerIds: [ada.id, ben.id],
    answer: null,
  },
};

export const page = (items: readonly unknown[]) => ({ items, nextCursor: null });
