import fs from 'node:fs';
import path from 'node:path';
import type { Page } from 'playwright-core';
import type { DeskRole } from '@/shared/permissions';

export type SignIn = { email: string; password: string; role: DeskRole; desk: string };

const file = path.join(__dirname, '../../../server/seed/sign-ins.json');
const signIns = JSON.parse(fs.readFileSync(file, 'utf8')) as SignIn[];

/** The first demonstration person of a role on a desk. */
export function personOf(role: DeskRole, desk = 'Commodities'): SignIn {
  const person = signIns.find((one) => one.role === role && one.desk === desk);
  if (!person) throw new Error(`No demonstration sign-in for ${role} of ${desk}.`);
  return person;
}

/** Fills in the sign-in page and waits until a desk is open. */
export async function signInAs(page: Page, person: SignIn): Promise<void> {
  await page.goto('/');
  await page.getByLabel('E-mail').fill(person.email);
  await page.getByLabel('Password').fill(person.password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL(/\/desks\//);
}

/** The desk that the page is on. */
export function deskOf(page: Page): string {
  const match = /\/desks\/([0-9a-f-]{36})/.exec(page.url());
  if (!match) throw new Error(`${page.url()} is on no desk.`);
  return match[1];
}
