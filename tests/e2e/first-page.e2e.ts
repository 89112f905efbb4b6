import { expect, it } from 'vitest';
import { newVisitor } from '../setup/browser';

it('sends a visitor who is not signed in to the sign-in page, with a policy against foreign scripts', async () => {
  const { page, context, complaints } = await newVisitor();
  const answer = await page.goto('/');
  expect(new URL(page.url()).pathname).toBe('/sign-in');
  expect(answer?.headers()['content-security-policy']).toMatch(/script-src 'self' 'nonce-/);
  expect(await page.title()).toContain('Stepwell');
  expect(complaints).toEqual([]);
  await context.close();
});
