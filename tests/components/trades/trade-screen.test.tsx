/** A trade’s page: who is offered what, and what a binding act says before it is sent. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { differencesOf } from '@/components/trades/differences';
import { TradeScreen } from '@/components/trades/trade-screen';
import type { Trade } from '@/shared/contracts/trades';
import type { DeskRole } from '@/shared/permissions';
import { playDialogs, playWindow } from '../browser';
import { saying } from '../saying';
import {
  ada,
  amended,
  ben,
  cleo,
  deskOf,
  playServer,
  problem,
  tradeWith,
  version,
  type Sent,
} from './play-trades';

// Looking things up by role is slow in jsdom, and the machine may be busy.
jest.setTimeout(60_000);

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

let trade: Trade;
let answer: () => ReturnType<typeof problem>;
let sent: Sent[];

async function open(role: DeskRole, userId: string) {
  sent = playServer(
    () => ({ [`/trades/${trade.id}`]: trade }),
    () => answer(),
  );
  render(
    <QueryClientProvider client={new QueryClient()}>
      <TradeScreen desk={deskOf(role)} userId={userId} tradeId={trade.id} />
    </QueryClientProvider>,
  );
  await screen.findByRole('heading', { level: 1, name: 'Trade T-0001' });
}

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
  localStorage.clear();
  trade = tradeWith([version()]);
  answer = () => {
    trade = { ...trade, status: 'live', version: 5 };
    return { status: 200, body: trade };
  };
});

const acts = ['Approve', 'Return', 'Close trade', 'Record the end'];
const offered = () => acts.filter((name) => screen.queryByRole('button', { name }) !== null);
const dialog = () => within(screen.getByRole('dialog'));
/** The dialog is fetched when it is first opened. */
async function press(name: string) {
  await userEvent.click(screen.getByRole('button', { name }));
  await screen.findByRole('dialog');
}

const confirm = (name: string) => userEvent.click(dialog().getByRole('button', { name }));

const live = () =>
  tradeWith([version({ state: 'approved', decidedBy: cleo, decidedAt: '2026-12-01T09:20:00Z' })], {
    status: 'live',
  });

test.each([
  ['a desk head', 'desk-head', cleo.id, () => trade, ['Approve', 'Return']],
  ['who proposed it', 'desk-head', ada.id, () => trade, []],
  ['who amended it last', 'desk-head', ben.id, amended, ['Record the end']],
  [
    'a head before an amendment',
    'desk-head',
    cleo.id,
    amended,
    acts.filter((a) => a !== 'Close trade'),
  ],
  ['a head before a live trade', 'desk-head', cleo.id, live, ['Close trade', 'Record the end']],
  ['an analyst', 'analyst', ben.id, () => trade, []],
  ['a risk officer', 'risk-officer', ben.id, live, []],
  ['an auditor', 'auditor', ben.id, live, []],
] as const)('%s is offered just what is allowed', async (_, role, userId, shown, expected) => {
  trade = shown();
  await open(role, userId);
  expect(offered()).toEqual(expected);
});

test('whoever made it is told that someone else decides', async () => {
  await open('desk-head', ada.id);
  expect(screen.getByText(/You proposed or amended this trade/)).toBeTruthy();
  expect(screen.getByText(/a desk head other than Ada/)).toBeTruthy();
});

test('approval says what comes into force, and is sent with the version that was seen', async () => {
  await open('desk-head', cleo.id);
  await press('Approve');
  expect(dialog().getByText(/terms of trade T-0001 come into force on GRAIN/)).toBeTruthy();
  await confirm('Approve');
  expect(await screen.findByText('Trade T-0001 is approved.')).toBeTruthy();
  expect(sent).toMatchObject([{ path: `trades/${trade.id}/approval`, body: { version: 4 } }]);
  expect(offered()).toEqual(['Close trade', 'Record the end']);
});

test('a return needs a reason, and says to whom the trade goes back', async () => {
  await open('desk-head', cleo.id);
  await press('Return');
  expect(dialog().getByText(/goes back to Ada/)).toBeTruthy();
  await confirm('Return');
  expect((await dialog().findByRole('alert')).textContent).toMatch(/at least 8 characters/);
  expect(sent).toEqual([]);
  await userEvent.type(dialog().getByLabelText('Reason'), 'The premium is wrong');
  await confirm('Return');
  expect(await screen.findByText('Trade T-0001 is returned.')).toBeTruthy();
  expect(sent[0].body).toEqual({ reason: 'The premium is wrong', version: 4 });
});

test('who comes second is told what the first one did, and decides on what stands now', async () => {
  await open('desk-head', cleo.id);
  await press('Approve');
  const message = 'Someone was first: trade T-0001 now waits for approval.';
  const succeed = answer;
  answer = () => {
    trade = { ...trade, version: 6 };
    return problem(409, 'stale-version', [{ path: '', code: 'stale-version', message }]);
  };
  await confirm('Approve');
  expect(await dialog().findByText(message)).toBeTruthy();
  answer = succeed;
  await confirm('Approve');
  expect(await screen.findByText('Trade T-0001 is approved.')).toBeTruthy();
  expect(sent.map(({ body }) => body.version)).toEqual([4, 6]);
});

test('a closing names amount and day before it is sent, and takes amounts as people type them', async () => {
  trade = live();
  await open('desk-head', cleo.id);
  await press('Close trade');
  await userEvent.type(dialog().getByLabelText('Amount received'), '-1.25k');
  expect(dialog().getByText(saying(/is closed on .* for \u22121 250\.00 EUR/))).toBeTruthy();
  await userEvent.type(dialog().getByLabelText('Reason'), 'Bought back early');
  await confirm('Close trade');
  expect(await screen.findByText('Trade T-0001 is closed.')).toBeTruthy();
  expect(sent[0].body).toMatchObject({ amount: '-1250', currency: 'EUR', version: 4 });
});

test('what is typed for a closing is kept over a reload until it is recorded', async () => {
  trade = live();
  await open('desk-head', cleo.id);
  await press('Close trade');
  await userEvent.type(dialog().getByLabelText('Reason'), 'Bought back early');
  cleanup();
  await open('desk-head', cleo.id);
  await press('Close trade');
  expect(dialog().getByLabelText('Reason')).toHaveProperty('value', 'Bought back early');
  await userEvent.type(dialog().getByLabelText('Amount received'), '5');
  await confirm('Close trade');
  await screen.findByText('Trade T-0001 is closed.');
  expect(
    localStorage.getItem(`driftless.trade-close.${trade.id}.${cleo.id}.${deskOf('desk-head').id}`),
  ).toBe('null');
});

test('an amendment shows only what it changes', async () => {
  trade = amended();
  await open('desk-head', cleo.id);
  const table = screen.getByRole('table', { name: 'What the new version changes' });
  expect(
    within(table)
      .getAllByRole('row')
      .map(({ textContent }) => textContent),
  ).toEqual(['fieldin forceproposed', 'Quantity1012']);
  expect(screen.getByText('Ben: Two more lots by phone')).toBeTruthy();
});

test('differences tell numbers by what they are worth, not how they are written', () => {
  const before = version({ quantity: '10.0', strike: '210.00' });
  const after = version({ quantity: '10', strike: '211', kind: 'call' });
  expect(differencesOf(before, after, 'Europe/Berlin')).toEqual([
    { field: 'Option', before: 'put', after: 'call' },
    { field: 'Strike', before: '210', after: '211' },
  ]);
});
