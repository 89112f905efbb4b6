import { expect } from 'vitest';
import { makeFirstAdministratorLink } from '@/lib/commands/first-administrator-link';
import { newVisitor, serverUrl, type Visitor, waitForMail } from '../setup/browser';
import { expectAccessible } from './accessible';
import { visit } from './visit';

export const PASSWORD = 'gravel lantern orchid 47';

/** A person of a journey in a window of their own, signed in. */
export interface SignedIn extends Visitor {
  readonly name: string;
  readonly email: string;
}

/** Signs a person in in a new window. */
export async function signIn(
  person: { name: string; email: string },
  options: Parameters<typeof newVisitor>[0] = {},
): Promise<SignedIn> {
  const visitor = await newVisitor(options);
  const { page } = visitor;
  await visit(page, '/sign-in');
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByLabel('Password', { exact: true }).fill(PASSWORD);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.waitForURL('**/today');
  return { ...visitor, ...person };
}

/** Makes the first administrator through the link the start prints, and signs them in. */
export async function firstAdministrator(person: { name: string; email: string }): Promise<SignedIn> {
  const link = await makeFirstAdministratorLink(serverUrl());
  if (link === null) throw new Error('There is an administrator already.');
  const visitor = await newVisitor();
  const { page } = visitor;
  await visit(page, link);
  await expectAccessible(page);
  await page.getByLabel('Printed name').fill(person.name);
  await page.getByLabel('E-mail address').fill(person.email);
  await page.getByLabel('New password', { exact: true }).fill(PASSWORD);
  await page.getByRole('button', { name: /create|set|save/i }).click();
  await page.waitForURL(/sign-in|today/);
  await visitor.context.close();
  return signIn(person);
}

/** Has the administrator invite a person, who accepts by the link in their mail. */
export async function invite(
  administrator: SignedIn,
  person: { name: string; email: string },
): Promise<void> {
  const { page } = administrator;
  await visit(page, '/administration/people');
  const form = page.getByRole('form', { name: 'Invite a person' });
  await form.getByLabel('Printed name').fill(person.name);
  await form.getByLabel('E-mail address').fill(person.email);
  await form.getByRole('button', { name: 'Send invitation' }).click();
  await page.getByText('A link that works once is on its way').waitFor();
  const mail = await waitForMail(person.email, /account in Stepwell/i);
  const link = /https?:\/\/\S+\/invitation\/\S+/.exec(mail.text)?.[0];
  if (!link) throw new Error('The invitation holds no link.');
  const visitor = await newVisitor({ width: 390 });
  await visit(visitor.page, link);
  await visitor.page.getByLabel('New password', { exact: true }).fill(PASSWORD);
  await visitor.page.getByRole('button', { name: /accept|set|save|join|create/i }).click();
  await visitor.page.waitForURL(/sign-in|today/);
  expect(visitor.complaints).toEqual([]);
  await visitor.context.close();
}
