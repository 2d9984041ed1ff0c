import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { ChainScreen } from '@/components/chain/chain-screen';
import { breakSentences, chainText } from '@/constants/texts/history';
import type { Chain, Verification } from '@/shared/contracts/chain';
import { playDialogs, playWindow } from '../browser';
import { desk } from '../../hooks/ticket-examples';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

const id = (digit: number) => `${digit}0000000-0000-4000-8000-000000000000`;
const hash = (digit: string) => digit.repeat(64);

const verification = (fields: Partial<Verification> = {}): Verification => ({
  id: id(1),
  chain: 'valuations',
  status: 'finished',
  held: null,
  total: 12,
  checked: 12,
  anchors: 2,
  firstBreak: null,
  startedBy: { id: id(2), name: 'Auditor' },
  startedAt: '2026-12-01T10:00:00.000Z',
  finishedAt: '2026-12-01T10:00:01.000Z',
  ...fields,
});

const chainOf = (kind: Chain['kind'], verifications: Verification[] = []): Chain => ({
  kind,
  position: 12,
  at: '2026-12-01T09:00:00.000001Z',
  hash: hash('a'),
  anchors: [],
  verifications,
});

type Sent = { url: string; method: string; body: unknown };

function playServer(verifications: Verification[]): Sent[] {
  const sent: Sent[] = [];
  const chains = {
    chains: [chainOf('valuations', verifications), chainOf('records')],
    publicKey: { keyId: '0123456789abcdef', pem: 'PEM' },
  };
  const fetch = jest.fn((url: string, init: { method: string; body?: string }) => {
    sent.push({ url, method: init.method, body: init.body && JSON.parse(init.body) });
    const body = url.includes('/verifications')
      ? verification({ status: 'queued', finishedAt: null })
      : url.includes('/exports')
        ? { items: [], nextCursor: null }
        : chains;
    return Promise.resolve({ ok: true, status: 200, json: () => Promise.resolve(body) });
  });
  Object.assign(globalThis, { fetch });
  return sent;
}

const show = () =>
  render(
    <QueryClientProvider client={new QueryClient()}>
      <ChainScreen desk={desk} />
    </QueryClientProvider>,
  );

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
});

const valuations = () => screen.findByRole('region', { name: chainText.kinds.valuations });

it('says that a chain is whole, and what it was compared with', async () => {
  playServer([verification()]);
  show();
  const section = await valuations();
  expect(within(section).getByText(chainText.whole(12))).toBeTruthy();
  expect(within(section).getByText(chainText.wholeBody(2))).toBeTruthy();
});

it('names the first break with its place', async () => {
  playServer([verification({ checked: 6, firstBreak: { kind: 'hash', position: 7 } })]);
  show();
  const section = await valuations();
  expect(within(section).getByRole('alert').textContent).toContain(chainText.broken(7));
  expect(within(section).getByText(breakSentences.hash)).toBeTruthy();
});

it('shows how far a verification is', async () => {
  playServer([verification({ status: 'running', checked: 5, finishedAt: null })]);
  show();
  expect(within(await valuations()).getByText(chainText.progress(5, 12))).toBeTruthy();
});

it('verifies with the place of a manifest that someone kept', async () => {
  const sent = playServer([]);
  show();
  const section = await valuations();
  const manifest = {
    version: 1,
    exportId: id(3),
    deskId: desk.id,
    fileName: 'history.csv',
    format: 'csv',
    filter: {},
    rows: 1,
    bytes: 10,
    sha256: hash('b'),
    chain: { name: 'x', firstPosition: 1, lastPosition: 9, headPosition: 9, headHash: hash('c') },
    engines: [],
    caution: 'Indicative.',
    madeBy: id(2),
    madeAt: '2026-11-01T10:00:00.000Z',
    keyId: '0123456789abcdef',
    signature: 'd'.repeat(128),
  };
  const file = Object.assign(new File([], 'manifest.json'), {
    text: () => Promise.resolve(JSON.stringify(manifest)),
  });
  await userEvent.upload(within(section).getByLabelText(chainText.held), file);
  expect(await within(section).findByText(chainText.heldChosen(9))).toBeTruthy();
  await userEvent.click(within(section).getByRole('button', { name: chainText.verify }));
  expect(sent.find(({ method }) => method === 'POST')?.body).toEqual({
    chain: 'valuations',
    held: { position: 9, hash: hash('c') },
  });
});

it('says when a file is no manifest', async () => {
  playServer([]);
  show();
  const section = await valuations();
  const file = Object.assign(new File([], 'other.json'), { text: () => Promise.resolve('{}') });
  await userEvent.upload(within(section).getByLabelText(chainText.held), file);
  expect(await within(section).findByText(chainText.heldUnreadable)).toBeTruthy();
});
