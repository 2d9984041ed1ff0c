/** The list of runs: what each found, what it waits for, and the way to another one. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { RunListScreen } from '@/components/runs/run-list-screen';
import type { RunSummary } from '@/shared/contracts/runs';
import { playWindow } from '../browser';
import { book, cleo, deskOf, playServer, problem } from '../trades/play-trades';
import { finishedRun, page, runningRun } from './play-runs';

jest.setTimeout(60_000);

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

const signedOff: RunSummary = {
  ...finishedRun,
  id: '99999999-9999-4999-8999-999999999903',
  number: 'R-0006',
  status: 'signed-off',
  openExceptions: 0,
  signOff: { by: cleo, at: '2026-11-28T09:00:00.000Z', comment: 'All were looked into.' },
};
const running: RunSummary = {
  ...runningRun,
  id: '99999999-9999-4999-8999-999999999904',
  number: 'R-0008',
};

function open(items: readonly RunSummary[], status: 'finished' | null = null) {
  playServer(
    () => ({ '/runs': page(items), '/books': { books: [book] } }),
    () => problem(405, 'method-not-allowed'),
  );
  const onFilter = jest.fn();
  render(
    <QueryClientProvider client={new QueryClient()}>
      <RunListScreen
        desk={deskOf('risk-officer')}
        filter={{ status, bookId: null }}
        onFilter={onFilter}
      />
    </QueryClientProvider>,
  );
  return onFilter;
}

const rowOf = async (number: string) => {
  const row = (await screen.findByText(number)).closest('tr');
  if (!row) throw new Error(`Run ${number} stands in no row.`);
  return within(row);
};

it('shows progress, open exceptions and who signed off', async () => {
  playWindow({ wide: true });
  open([running, finishedRun, signedOff]);
  expect((await rowOf('R-0008')).getByText('1 of 4 trades')).toBeTruthy();
  const waiting = await rowOf('R-0007');
  expect(waiting.getByText('2 of 2 open')).toBeTruthy();
  expect(waiting.getByText('2 agree, 1 disagree, 1 without value')).toBeTruthy();
  expect((await rowOf('R-0006')).getByText('Cleo')).toBeTruthy();
});

it('shows cards on a phone', async () => {
  playWindow({ wide: false });
  open([finishedRun]);
  const list = await screen.findByRole('list', { name: /^Valuation runs/ });
  expect(within(list).getByRole('link', { name: 'R-0007' })).toBeTruthy();
  expect(within(list).getByText('2 open')).toBeTruthy();
});

it('offers to start one where there is none, and to clear filters that find none', async () => {
  playWindow({ wide: true });
  const onFilter = open([], 'finished');
  await userEvent.click(await screen.findByRole('button', { name: 'Show all runs' }));
  expect(onFilter).toHaveBeenCalledWith({ status: null, bookId: null });
  expect(screen.getByRole('link', { name: 'Start a run' })).toBeTruthy();
});
