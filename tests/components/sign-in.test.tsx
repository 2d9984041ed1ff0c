import { render, screen } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { TextEncoder } from 'node:util';
import { SignInPage } from '@/components/shell/sign-in-page';
import { readSession } from '@/hooks/api';
import { playWindow } from './browser';

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

// Typing and looking up by role are slow in jsdom, and the machine may be busy.
jest.setTimeout(60_000);

let answer: () => Promise<{ ok: boolean; status: number; json: () => Promise<unknown> }>;
let sent: unknown[];

const reply = (status: number, body: unknown) => async () => ({
  ok: status < 400,
  status,
  json: async () => body,
});

const problem = (status: number, code: string, title: string) =>
  reply(status, { type: 'about:blank', title, status, code, requestId: 'r1', issues: [] });

beforeEach(() => {
  global.TextEncoder = TextEncoder;
  playWindow({ wide: false });
  sent = [];
  global.fetch = (async (_: string, init: RequestInit) => {
    sent.push(JSON.parse(String(init.body)));
    return answer();
  }) as typeof fetch;
});

async function attempt(email: string, password: string) {
  render(<SignInPage />);
  await userEvent.click(screen.getByLabelText('E-mail'));
  await userEvent.paste(email);
  await userEvent.click(screen.getByLabelText('Password'));
  await userEvent.paste(password);
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
}

test('errors of the form stand at their fields, and nothing is sent', async () => {
  await attempt('nobody', '');
  expect(
    await screen.findByText('Give an e-mail address, such as name@firm.example.'),
  ).toBeTruthy();
  expect(screen.getByText('Enter your password.')).toBeTruthy();
  expect(screen.getByLabelText('E-mail').getAttribute('aria-invalid')).toBe('true');
  expect(sent).toEqual([]);
});

test('a refusal stands at the password, and the e-mail is kept', async () => {
  answer = problem(401, 'sign-in-failed', 'E-mail or password is not right.');
  await attempt('analyst@tarnfield.example', 'wrong');
  expect(await screen.findByText('E-mail or password is not right.')).toBeTruthy();
  expect(screen.getByLabelText('Password').getAttribute('aria-invalid')).toBe('true');
  expect(screen.getByLabelText<HTMLInputElement>('E-mail').value).toBe('analyst@tarnfield.example');
});

test('too many attempts and a server that is gone are said above the button', async () => {
  answer = problem(
    429,
    'too-many-attempts',
    'Too many attempts. Wait a few minutes, then try again.',
  );
  await attempt('analyst@tarnfield.example', 'wrong');
  expect(await screen.findByText(/Too many attempts/)).toBeTruthy();
  answer = () => Promise.reject(new TypeError('Failed to fetch'));
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
  expect(await screen.findByText(/The server does not answer/)).toBeTruthy();
  expect(screen.queryByText(/Too many attempts/)).toBeNull();
});

test('a right password signs in', async () => {
  const user = { id: '00000000-0000-4000-8000-000000000001', name: 'Analyst' };
  answer = reply(201, {
    accessToken: 'token',
    expiresInSeconds: 600,
    me: { user: { ...user, email: 'analyst@tarnfield.example' }, desks: [] },
  });
  await attempt(' Analyst@Tarnfield.example ', 'right');
  await screen.findByRole('button', { name: 'Sign in', busy: false });
  expect(sent).toEqual([{ email: 'analyst@tarnfield.example', password: 'right' }]);
  expect(readSession()).toMatchObject({ status: 'signed-in', me: { user } });
});
