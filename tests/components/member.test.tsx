/** The member page against a server that is played by a function. */
import { QueryClientProvider } from '@tanstack/react-query';
import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { TextEncoder } from 'node:util';
import { MemberScreen } from '@/components/people/member-screen';
import { queryClient, restoreSession } from '@/hooks/api';
import type { Member } from '@/shared/contracts/people';
import { effectivePermissions, type DeskRole } from '@/shared/permissions';
import { playDialogs, playWindow } from './browser';
import { saying } from './saying';

// Looking things up by role is slow in jsdom, and the machine may be busy.
jest.setTimeout(60_000);

const mockDeskId = '00000000-0000-4000-8000-00000000000a';

jest.mock('expo-router', () => ({
  useRouter: () => ({ push: jest.fn(), replace: jest.fn() }),
  useLocalSearchParams: () => ({ deskId: mockDeskId }),
}));

const person = (digit: number, name: string) => ({
  id: `00000000-0000-4000-8000-00000000000${digit}`,
  name,
});
const head = person(1, 'Desk head');
const ada = person(2, 'Ada');

let subject: Member;
let sent: { path: string; body: Record<string, unknown>; key: string | undefined }[];
let answer: () => { status: number; body: unknown };

const memberOf = (role: DeskRole): Member => ({
  user: { ...ada, email: 'ada@tarnfield.example' },
  role,
  memberSince: '2026-09-01',
  suspendedAt: null,
  suspensionReason: null,
  permissions: effectivePermissions(role, []),
  changes: [],
  version: 3,
});

const session = (role: DeskRole, user: typeof head) => ({
  accessToken: 'token',
  expiresInSeconds: 600,
  me: {
    user: { ...user, email: 'who@tarnfield.example' },
    desks: [
      {
        id: mockDeskId,
        name: 'Commodities',
        timeZone: 'Europe/Berlin',
        expiryCutoff: '17:30',
        role,
        suspended: false,
        permissions: effectivePermissions(role, []),
      },
    ],
  },
});

const problem = (status: number, code: string, issues: object[] = []) => ({
  status,
  body: { type: 'about:blank', title: code, status, code, requestId: 'r1', issues },
});

async function open(role: DeskRole, user = head) {
  global.fetch = (async (url: string, init: RequestInit) => {
    const reply = (status: number, body: unknown) => ({
      ok: status < 400,
      status,
      json: async () => body,
    });
    if (url.endsWith('/sessions/refresh')) return reply(200, session(role, user));
    if (init.method === 'GET') return reply(200, { members: [subject] });
    const headers = init.headers as Record<string, string>;
    sent.push({
      path: url.split('/people/')[1],
      body: JSON.parse(String(init.body)),
      key: headers['idempotency-key'],
    });
    const { status, body } = answer();
    return reply(status, body);
  }) as typeof fetch;
  localStorage.setItem('driftless.signed-in', 'true');
  await restoreSession();
  render(
    <QueryClientProvider client={queryClient}>
      <MemberScreen userId={ada.id} />
    </QueryClientProvider>,
  );
  await screen.findByRole('heading', { level: 1, name: 'Ada' });
}

beforeEach(() => {
  global.TextEncoder = TextEncoder;
  queryClient.clear();
  playWindow({ wide: true });
  playDialogs();
  subject = memberOf('analyst');
  sent = [];
  answer = () => {
    subject = { ...subject, version: subject.version + 1 };
    return { status: 201, body: subject };
  };
});

const button = (name: string | RegExp) => screen.getByRole('button', { name });
const dialog = () => within(screen.getByRole('dialog'));

/** The dialog is fetched when it is first opened. */
async function start(act: string) {
  await userEvent.click(button(act));
  await screen.findByRole('dialog');
}

async function fill(label: string, text: string) {
  await userEvent.click(dialog().getByLabelText(label));
  await userEvent.paste(text);
}

async function fillGrant() {
  await start('Grant a permission');
  await userEvent.selectOptions(
    dialog().getByLabelText('Permission'),
    'Export the valuation history and verify the chain',
  );
  await fill('Reason', 'Prepares the quarterly file');
}

test('a grant shows what will happen, then sends it with version and key', async () => {
  await open('desk-head');
  await fillGrant();
  await fill('Last day', '2999-03-31');
  expect(dialog().getByText(saying(/Ada may do this until 2999-03-31/))).toBeTruthy();
  await userEvent.click(dialog().getByRole('button', { name: 'Grant a permission' }));
  expect(await screen.findByText('Ada has the permission.')).toBeTruthy();
  expect(sent).toEqual([
    {
      path: `${ada.id}/permissions`,
      body: {
        permission: 'export-history',
        effect: 'grant',
        endsOn: '2999-03-31',
        reason: 'Prepares the quarterly file',
        version: 3,
      },
      key: expect.stringMatching(/^[0-9a-f-]{36}$/),
    },
  ]);
});

test('a version that is stale is read again, and what was typed is kept', async () => {
  await open('desk-head');
  await fillGrant();
  const succeed = answer;
  answer = () => {
    subject = { ...subject, version: 4 };
    return problem(409, 'stale-version');
  };
  const confirm = () => dialog().getByRole('button', { name: 'Grant a permission' });
  await userEvent.click(confirm());
  expect(await screen.findByText('Someone changed this membership meanwhile')).toBeTruthy();
  expect(dialog().getByLabelText<HTMLTextAreaElement>('Reason').value).toBe(
    'Prepares the quarterly file',
  );
  answer = succeed;
  await userEvent.click(confirm());
  expect(await screen.findByText('Ada has the permission.')).toBeTruthy();
  expect(sent.map(({ body }) => body.version)).toEqual([3, 4]);
  expect(sent[0].key).not.toBe(sent[1].key);
});

test('a reason that is too short and a day that is past are said at their fields', async () => {
  await open('desk-head');
  await start('Grant a permission');
  await fill('Last day', '2020-01-01');
  await fill('Reason', 'short');
  await userEvent.click(dialog().getByRole('button', { name: 'Grant a permission' }));
  const alerts = await dialog().findAllByRole('alert');
  expect(alerts.map(({ textContent }) => textContent)).toEqual([
    'Give a day from today on as YYYY-MM-DD, or a tenor such as 3m.',
    'Give a reason of at least 8 characters; others will read it.',
  ]);
  expect(sent).toEqual([]);
});

test('what stands in the way of the whole act is said above the buttons', async () => {
  await open('desk-head');
  answer = () =>
    problem(422, 'validation-failed', [
      { path: '', code: 'last-desk-head', message: 'This is the desk’s last desk head.' },
    ]);
  await start('Suspend');
  await fill('Reason', 'On leave until spring');
  await userEvent.click(dialog().getByRole('button', { name: 'Suspend' }));
  expect(await dialog().findByText('This is the desk’s last desk head.')).toBeTruthy();
});

test.each([
  ['an analyst', 'analyst', head, 'analyst', 'Roles and permissions are set by the desk head.'],
  ['the member themself', 'desk-head', ada, 'analyst', 'Nobody changes their own permissions.'],
  ['a control role', 'desk-head', head, 'risk-officer', 'appointed by the firm’s administrator'],
] as const)('%s is offered no act, and is told why', async (_, role, user, subjectRole, why) => {
  subject = memberOf(subjectRole);
  await open(role, user);
  expect(screen.getByText(new RegExp(why))).toBeTruthy();
  for (const name of ['Change role', 'Grant a permission', 'Withdraw a permission', 'Suspend'])
    expect(screen.queryByRole('button', { name })).toBeNull();
});
