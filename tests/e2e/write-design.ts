import type { Page } from 'playwright-core';

/** The design of the journey: Robbins & Monro, a_k = 60/k, target 0.3, 0 to 200 mg by 1, start 50, window one hour. */
export async function writeDesign(page: Page): Promise<void> {
  const form = page.getByRole('form', { name: 'Design' });
  const fill = (label: string, text: string) =>
    form.getByRole('textbox', { name: new RegExp(`^${label}(, |$)`) }).fill(text);
  const choose = (group: string, choice: RegExp) =>
    form.getByRole('group', { name: group, exact: true }).getByRole('radio', { name: choice }).check();
  await fill('Label when present', 'drowsiness');
  await fill('Label when absent', 'no drowsiness');
  await choose('A response is', /^a harm/);
  await fill('Target probability Γ', '0.3');
  await choose('Doses are', /^a range/);
  await fill('Lowest dose', '0');
  await fill('Highest dose', '200');
  await fill('Increment', '1');
  await fill('Starting dose', '50');
  await choose('Working scale', /^linear/);
  await choose('Rule', /^Robbins/);
  await fill('Gain constant c', '60');
  await fill('Gain offset k0', '0');
  // The convergence conditions are checked as one types.
  await fill('Gain exponent γ', '0.4');
  await form.getByText(/1\/2/).first().waitFor();
  await fill('Gain exponent γ', '1');
  await choose('Largest rise from one cohort to the next', /^a step on the working scale/);
  await fill('Largest step', '100');
  await choose('Coherence', /^off/);
  await choose('Closed doses', /^not used/);
  await fill('Cohort size', '3');
  await fill('Observation window', '1');
  await choose('Unit of the window', /^hours/);
  await form.getByRole('button', { name: 'Save the draft' }).click();
  await page.getByText('Saved as the draft.').waitFor();
}
