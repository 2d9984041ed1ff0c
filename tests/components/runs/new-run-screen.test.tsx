/** Starting a run: what is chosen, what stands in the way, and what the server refuses. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { NewRunScreen } from '@/components/runs/new-run-screen';
import type { SnapshotSummary } from '@/shared/contracts/market-data';
import type { Policy } from '@/shared/contracts/policies';
import { playWindow } from '../browser';
import { saying } from '../saying';
import {
  ada,
  ben,
  book,
  cleo,
  deskOf,
  playServer,
  problem,
  type Sent,
} from '../trades/play-trades';
import { finishedRun, page, runId } from './play-runs';

jest.setTimeout(60_000);

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

const freight = { ...book, id: '66666666-6666-4666-8666-666666666662', code: 'FREIGHT', live: 5 };
const empty = { ...book, id: '66666666-6666-4666-8666-666666666663', code: 'EMPTY', live: 0 };

const closeOf = (digit: number, date: string): SnapshotSummary => ({
  id: `44444444-4444-4444-8444-44444444444${digit}`,
  date,
  status: 'approved',
  source: 'typed',
  quoteCount: 3,
  enteredBy: ada,
  enteredAt: `${date}T17:00:00.000Z`,
  approvedBy: ben,
  approvedAt: `${date}T18:00:00.000Z`,
});
const closes = [closeOf(2, '2026-11-30'), closeOf(1, '2026-11-27')];

const policy: Policy = {
  id: '55555555-5555-4555-8555-555555555555',
  number: 3,
  status: 'approved',
  version: 1,
  primaryEuropean: 'closed-form',
  checkEuropean: 'heat-crank-nicolson',
  primaryAmerican: 'heat-crank-nicolson',
  checkAmerican: 'lattice-symmetric',
  refinement: { by: 'tolerance', share: 0.1 },
  unitTolerance: {},
  moneyTolerance: {},
  reason: 'First policy of the desk',
  author: ada,
  authoredAt: '2026-11-01T09:00:00.000Z',
  savedAt: null,
  makerIds: [ada.id],
  approvedBy: ben,
  approvedAt: '2026-11-02T09:00:00.000Z',
};

function open(
  served: object = {},
  answer: (sent: Sent) => ReturnType<typeof problem> | 'away' = () =>
    problem(405, 'method-not-allowed'),
) {
  const sent = playServer(
    () => ({
      '/books': { books: [book, freight, empty] },
      '/market-data': page(closes),
      '/policies': { policies: [policy] },
      ...served,
    }),
    answer,
  );
  const onStarted = jest.fn();
  const { unmount } = render(
    <QueryClientProvider client={new QueryClient()}>
      <NewRunScreen desk={deskOf('risk-officer')} userId={cleo.id} onStarted={onStarted} />
    </QueryClientProvider>,
  );
  return { sent, onStarted, unmount };
}

const startButton = () => screen.findByRole('button', { name: 'Start the run' });
const tick = async (code: string) =>
  userEvent.click(await screen.findByRole('checkbox', { name: new RegExp(code) }));

beforeEach(() => {
  playWindow({ wide: true });
  localStorage.clear();
});

it('says how many trades are valued, on which close and by which policy, and starts once', async () => {
  const { sent, onStarted } = open({}, () => ({ status: 201, body: finishedRun }));
  const button = await startButton();
  expect(button).toHaveProperty('disabled', true);
  expect(screen.getByText('Policy 3, in force')).toBeTruthy();
  await tick('GRAIN');
  await tick('FREIGHT');
  expect(
    screen.getByText(saying(/^6 live trades of 2 books are valued on the close of 2026-11-30/)),
  ).toBeTruthy();
  await userEvent.selectOptions(screen.getByRole('combobox'), '2026-11-27');
  expect(screen.getByText(saying(/on the close of 2026-11-27/))).toBeTruthy();
  await userEvent.click(button);
  await waitFor(() => expect(onStarted).toHaveBeenCalledWith(runId));
  expect(sent).toMatchObject([
    { path: 'runs', body: { bookIds: [book.id, freight.id], snapshotId: closes[1].id } },
  ]);
});

it('keeps what is chosen over a reload, but no close that a newer one has followed', async () => {
  const { unmount } = open();
  await tick('FREIGHT');
  await userEvent.selectOptions(screen.getByRole('combobox'), '2026-11-27');
  unmount();
  const again = open();
  expect(
    await screen.findByText(saying(/^5 live trades of 1 book .* on the close of 2026-11-27/)),
  ).toBeTruthy();
  again.unmount();
  open({ '/market-data': page([closeOf(3, '2026-12-01'), ...closes]) });
  expect(
    await screen.findByText(saying(/^5 live trades of 1 book .* on the close of 2026-12-01/)),
  ).toBeTruthy();
});

it('does not start what has nothing to value', async () => {
  open();
  await tick('EMPTY');
  expect(screen.getByText(/have no live trade/)).toBeTruthy();
  expect(await startButton()).toHaveProperty('disabled', true);
});

it.each([
  ['no close is approved', { '/market-data': page([]) }, 'No close is approved yet'],
  ['no policy is in force', { '/policies': { policies: [] } }, 'No pricing policy is in force'],
])('says where to go where %s', async (_, served, title) => {
  open(served);
  expect(await screen.findByText(title)).toBeTruthy();
  await tick('GRAIN');
  expect(await startButton()).toHaveProperty('disabled', true);
});

it('shows a refusal at what it is about, and sends the next try as another request', async () => {
  const message = 'Someone was first: run R-0008 is valuing book GRAIN.';
  const issue = { path: 'bookIds', code: 'book-in-run', message };
  const { sent } = open({}, () => problem(409, 'wrong-state', [issue]));
  await tick('GRAIN');
  await userEvent.click(await startButton());
  expect(await screen.findByText(message)).toBeTruthy();
  await userEvent.click(await startButton());
  await waitFor(() => expect(sent).toHaveLength(2));
  expect(sent[0].key).not.toBe(sent[1].key);
});

it('sends the same request again where the server did not answer', async () => {
  const { sent } = open({}, () => 'away');
  await tick('GRAIN');
  await userEvent.click(await startButton());
  expect(await screen.findByText(/^The server did not answer/)).toBeTruthy();
  await userEvent.click(await startButton());
  await waitFor(() => expect(sent).toHaveLength(2));
  expect(sent[0].key).toBe(sent[1].key);
});
