/** A study as its readers meet it: rows that come, digits that settle, the verdict, the decision. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { act, render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { StudyScreen } from '@/components/studies/study-screen';
import type { Contract, Market, MethodName } from '@/pricing/contract';
import {
  planLadder,
  runStudyRow,
  studyReference,
  summariseStudy,
  theoreticalOrder,
} from '@/pricing/study';
import type { Study, StudyRoute } from '@/shared/contracts/studies';
import { playDialogs, playWindow } from '../browser';
import { saying } from '../saying';
import { desk, wheat } from '../../hooks/ticket-examples';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

jest.setTimeout(60_000);

const contract: Contract = {
  payoff: 'vanilla',
  exercise: 'european',
  kind: 'put',
  strike: 210,
  expiry: 0.5,
};
const market: Market = { spot: 212.4, rate: 0.03, carry: 'future', volatility: 0.245 };

function referenceOf() {
  const found = studyReference(contract, market);
  if ('ok' in found) throw new Error(found.message);
  return found;
}

/** What the server would send of one method, with so many of its rows done. */
function routeWith(name: MethodName, rows: number, done = Infinity): StudyRoute {
  const order = theoreticalOrder(name, contract.exercise);
  if (order === null) throw new Error(`${name} has nothing to refine`);
  const steps = planLadder(name, contract, market, { rows });
  const computed = steps.slice(0, done).map((step) => runStudyRow(contract, market, step));
  const { rows: findings, fits } = summariseStudy(computed, order, referenceOf());
  return {
    name,
    theoreticalOrder: order,
    planned: steps.length,
    fits,
    rows: computed.map(({ result, ...row }, i) => ({
      ...row,
      value: result.ok ? result.value : null,
      failure: result.ok ? null : result.message,
      warning: result.ok ? (result.warnings[0]?.message ?? null) : null,
      stability: result.ok ? (result.diagnostics.stabilityNumber ?? null) : null,
      amplification: result.ok ? (result.diagnostics.amplification ?? null) : null,
      milliseconds: 0.0123,
      ...findings[i],
    })),
  };
}

const starter = { id: '11111111-1111-4111-8111-111111111111', name: 'Ada Fenn' };
const reader = '22222222-2222-4222-8222-222222222222';

function studyWith(routes: StudyRoute[], fields: Partial<Study> = {}): Study {
  const { id, symbol, name, currency, unit, priceDecimals } = wheat;
  return {
    id: '33333333-3333-4333-8333-333333333333',
    number: 'S-0001',
    source: 'free',
    quote: null,
    trade: null,
    underlying: { id, symbol, name, currency, unit, priceDecimals },
    kind: 'put',
    exercise: 'european',
    strike: '210',
    expiryDate: '2027-06-01',
    market,
    pricedAt: '2026-12-01T10:00:00.000Z',
    expiryYears: 0.5,
    engine: '1.0.0',
    status: 'finished',
    total: routes.reduce((sum, { planned }) => sum + planned, 0),
    done: routes.reduce((sum, { rows }) => sum + rows.length, 0),
    reference: referenceOf(),
    routes,
    startedBy: starter,
    createdAt: '2026-12-01T10:00:00.000Z',
    finishedAt: null,
    decision: null,
    version: 1,
    ...fields,
  };
}

/** A server that has this study until it is sent something, or has been read once, and then that. */
function playServer(before: Study, after = before, until: 'act' | 'read' = 'act') {
  const sent: { url: string; body: unknown }[] = [];
  let reads = 0;
  const fetch = jest.fn((url: string, { method, body }: RequestInit) => {
    if (method === 'GET') reads++;
    else sent.push({ url, body: JSON.parse(String(body)) });
    const changed = until === 'act' ? sent.length > 0 : reads > 1;
    const study = changed ? after : before;
    return Promise.resolve({ ok: true, status: 200, json: () => Promise.resolve(study) });
  });
  Object.assign(globalThis, { fetch });
  return sent;
}

const officer = {
  ...desk,
  permissions: [...desk.permissions, 'run-studies' as const, 'sign-off-studies' as const],
};

function open(on = officer, userId = reader) {
  const studyId = '33333333-3333-4333-8333-333333333333';
  render(
    <QueryClientProvider client={new QueryClient()}>
      <StudyScreen desk={on} studyId={studyId} userId={userId} />
    </QueryClientProvider>,
  );
}

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
});

const grid = routeWith('heat-crank-nicolson', 5);

describe('a finished study', () => {
  it('says in one line what order was found and what was expected', async () => {
    playServer(studyWith([grid]));
    open();
    const [{ order, standardError }] = grid.fits;
    expect(standardError).toBeGreaterThan(0.005);
    const sentence = `Order ${order?.toFixed(2)} ± ${standardError?.toFixed(2)}, as expected of Crank–Nicolson with four damped half-steps`;
    expect(await screen.findByText(sentence)).toBeTruthy();
    expect(screen.getByText(/against closed form, error below/)).toBeTruthy();
  });

  it('sets settled digits in ink and moving ones apart', async () => {
    playServer(studyWith([grid]));
    open();
    const size = await screen.findByText(/^100.×.50$/);
    const row = size.closest('tr');
    if (!row) throw new Error('The size stands in no row.');
    const { value, settledDigits } = grid.rows[1];
    const cell = within(row).getAllByRole('cell')[0];
    expect(cell.textContent).toBe(value?.toFixed(6));
    const moving = cell.querySelector('span');
    const settled = cell.textContent?.slice(0, -(moving?.textContent?.length ?? 0));
    expect(settled?.replace(/\D/g, '')).toHaveLength(settledDigits);
  });

  it('shows the explicit grid past its limit, with why', async () => {
    playServer(studyWith([routeWith('heat-explicit', 3)]));
    open();
    expect(await screen.findByText('Past the stability limit')).toBeTruthy();
    expect(screen.getByText(/past ½, the walk would stay with a probability of −0/)).toBeTruthy();
    expect(screen.getByText(/^unstable, ×\d\.\d\d a step$/)).toBeTruthy();
  });

  it('keeps odd and even lengths of a walk apart', async () => {
    playServer(studyWith([routeWith('lattice-crr', 3)]));
    open();
    expect(await screen.findByRole('region', { name: 'CRR walk, odd lengths' })).toBeTruthy();
    expect(screen.getByRole('region', { name: 'CRR walk, even lengths' })).toBeTruthy();
    expect(screen.getByText(/^Odd lengths: order/)).toBeTruthy();
  });
});

describe('the chart', () => {
  it('is read by keys, and is a table when asked', async () => {
    playServer(studyWith([grid]));
    open();
    const chart = await screen.findByRole('img', { name: /Error against size, heat grid/ });
    act(() => chart.focus());
    await userEvent.keyboard('{ArrowRight}');
    expect(screen.getByText(/^Heat grid, 100: error \d\.\de−\d EUR$/)).toBeTruthy();
    await userEvent.click(screen.getByRole('button', { name: 'show as table' }));
    const table = screen.getByRole('table', { name: 'Error against size, heat grid' });
    expect(within(table).getAllByRole('row')).toHaveLength(1 + grid.rows.length);
  });
});

describe('a study that is being computed', () => {
  it('shows the rows there are, how far it is, and grows', async () => {
    const running = studyWith([routeWith('heat-crank-nicolson', 5, 2)], { status: 'running' });
    playServer(running, studyWith([grid]), 'read');
    open();
    const bar = await screen.findByRole('progressbar', { name: '2 of 5 rows' });
    expect(bar.getAttribute('aria-valuenow')).toBe('2');
    expect(screen.getByText(/^50.×.25$/)).toBeTruthy();
    expect(screen.queryByText(/^800.×.400$/)).toBeNull();
    expect(await screen.findByText(/^800.×.400$/, {}, { timeout: 5000 })).toBeTruthy();
  });

  it('can be stopped', async () => {
    const running = studyWith([routeWith('heat-crank-nicolson', 5, 2)], { status: 'running' });
    const sent = playServer(running, { ...running, status: 'cancelled' });
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Stop' }));
    expect(sent.map(({ url }) => url.split('/').at(-1))).toEqual(['cancel']);
    await waitFor(() => expect(screen.queryByRole('progressbar')).toBeNull());
  });
});

describe('the decision', () => {
  it('wants a comment before it is sent, and then sends it once', async () => {
    const finished = studyWith([grid]);
    const sent = playServer(finished);
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Sign off' }));
    expect(screen.getByText(/at least 8 characters/)).toBeTruthy();
    expect(sent).toEqual([]);
    await userEvent.type(screen.getByRole('textbox', { name: 'Comment' }), 'Orders are right.');
    await userEvent.click(screen.getByRole('button', { name: 'Sign off' }));
    await waitFor(() =>
      expect(sent).toMatchObject([{ body: { version: 1, comment: 'Orders are right.' } }]),
    );
    expect(sent[0].url).toMatch(/sign-off$/);
  });

  it('is not offered to whoever started the study, nor to those who may not', async () => {
    playServer(studyWith([grid]));
    open(officer, starter.id);
    expect(await screen.findByText(/You started this study/)).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Sign off' })).toBeNull();
  });

  it('stands there with its name and comment once it is made', async () => {
    const decision = {
      by: { id: reader, name: 'Noor Vale' },
      at: '2026-12-01T11:00:00.000Z',
      comment: 'Fine by me, all orders.',
    };
    playServer(studyWith([grid], { status: 'signed-off', decision }));
    open();
    expect(await screen.findByText(saying(/^Signed off by Noor Vale, /))).toBeTruthy();
    expect(screen.getByText(decision.comment)).toBeTruthy();
  });
});
