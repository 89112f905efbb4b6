import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { ActionResult } from '@/lib/schemas/action-result';
import { designSchema, type Design } from '@/lib/schemas/design';
import { designDefaults } from '@/lib/schemas/design-defaults';
import type { TrialFormInput } from '@/lib/schemas/trial-forms';
import { DesignForm } from './design-form';
import { designFormOffers } from './fresh-settings';

const refresh = vi.fn();
vi.mock('next/navigation', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ refresh }),
}));
beforeEach(() => refresh.mockClear());

const gains = {
  name: 'robbins-monro',
  c: 4.5,
  k0: 0,
  gamma: 1,
  carry: 'iterate',
  carryReason: null,
} as const;
const onLevels: Design = { ...designDefaults('levels'), rule: gains };

function show(design: Design = onLevels, answer: ActionResult<unknown> = { ok: true, value: null }) {
  const action = vi.fn<(input: TrialFormInput<'save-design'>) => Promise<ActionResult<unknown>>>(
    async () => answer,
  );
  const user = userEvent.setup({ delay: null });
  render(
    <DesignForm trialCode="WELL-99" design={design} offers={designFormOffers(design)} action={action} />,
  );
  const form = within(screen.getByRole('form', { name: 'Design' }));
  const field = (name: string | RegExp) => form.getByRole('textbox', { name });
  const retype = async (name: string | RegExp, text: string) => {
    await user.clear(field(name));
    await user.type(field(name), text);
  };
  const choose = (name: string | RegExp) => user.click(form.getByRole('radio', { name }));
  const save = () => user.click(form.getByRole('button', { name: 'Save the draft' }));
  const saved = async () => {
    await save();
    await waitFor(() => expect(action).toHaveBeenCalledTimes(1));
    return action.mock.calls[0]?.[0];
  };
  return { action, user, form, field, retype, choose, save, saved };
}

const SLOW = 20_000;

describe('the form of a design', { timeout: SLOW }, () => {
  it('sends exactly the schema’s input for a design nobody changed', async () => {
    for (const design of [onLevels, designDefaults('range')]) {
      const { saved } = show(design);
      const input = await saved();
      expect(input).toEqual({ trialCode: 'WELL-99', design, submissionKey: expect.any(String) });
      expect(designSchema.parse(input?.design)).toEqual(design);
      expect(refresh).toHaveBeenCalled();
      expect(screen.getByText(/Saved as the draft/)).toBeInTheDocument();
      document.body.replaceChildren();
    }
  });

  it('says the convergence conditions as γ is typed, at the field', async () => {
    const { retype, field, action, save, user, form } = show();
    await retype('Gain exponent γ', '0.4');
    const sentence = await form.findByText(
      /The gain exponent γ is 0\.4\. It must be above 0\.5 and at most 1/,
    );
    expect(sentence).toHaveTextContent('Σa_k = ∞');
    expect(sentence).toHaveTextContent('Σa_k² < ∞');
    expect(field('Gain exponent γ')).toHaveAccessibleDescription(/The gain exponent γ is 0\.4/);
    await save();
    expect(await screen.findByRole('alert')).toHaveTextContent('Not sent. One entry needs a change.');
    expect(action).not.toHaveBeenCalled();
    await user.clear(field('Gain exponent γ'));
    await user.type(field('Gain exponent γ'), '0.7');
    await waitFor(() => expect(field('Gain exponent γ')).not.toHaveAttribute('aria-invalid'));
  });

  it('names levels that do not increase at the level, and takes the word back when another level mends it', async () => {
    const { retype, field, form } = show();
    await retype('Level 3', '25');
    await new Promise((done) => setTimeout(done, 400));
    expect(field('Level 3')).not.toHaveAttribute('aria-invalid');
    await retype('Level 2', '28');
    expect(await form.findByText(/Level 3, 25, is not above level 2, 28/)).toBeInTheDocument();
    await retype('Level 3', '27');
    expect(await form.findByText(/Level 3, 27, is not above level 2, 28/)).toBeInTheDocument();
    expect(field('Level 3')).toHaveAttribute('aria-invalid', 'true');
    await retype('Level 2', '26');
    await waitFor(() => expect(field('Level 3')).not.toHaveAttribute('aria-invalid'));
  });

  it('adds and removes levels, and takes a pasted list', async () => {
    const { user, form, field, saved, retype } = show();
    await user.click(form.getByRole('button', { name: 'Add a level' }));
    await user.type(field('Level 7'), '160');
    await user.click(form.getByRole('button', { name: 'Remove level 2' }));
    expect(
      form.getAllByRole('textbox', { name: /^Level \d/ }).map((each) => (each as HTMLInputElement).value),
    ).toEqual(['10', '40', '60', '90', '120', '160']);
    await user.click(form.getByRole('button', { name: 'Paste a list' }));
    await user.type(field('List of levels'), '5');
    await user.click(form.getByRole('button', { name: 'Use this list' }));
    expect(form.getByText(/There is one level in the list/)).toBeInTheDocument();
    await user.clear(field('List of levels'));
    await user.type(field('List of levels'), '0.5, 1;2 3.5');
    await user.click(form.getByRole('button', { name: 'Use this list' }));
    await retype('Starting dose, mg', '0.5');
    await user.click(form.getByRole('radio', { name: 'not bounded' }));
    const input = await saved();
    expect(input?.design.doses).toEqual({ kind: 'levels', levels: ['0.5', '1', '2', '3.5'] });
    expect(input?.design.guardrails.largestRise).toBeNull();
  });

  it('keeps what was typed for another rule, and sends the chosen one alone', async () => {
    const { retype, choose, field, saved } = show();
    await retype('Gain constant c, ln mg', '7.5');
    await choose(/^Virtual observations/);
    expect(screen.queryByRole('textbox', { name: 'Gain constant c, ln mg' })).toBeNull();
    await retype('Assumed slope b, per ln mg', '0.3');
    await choose(/^Robbins–Monro/);
    expect(field('Gain constant c, ln mg')).toHaveValue('7.5');
    await choose(/^Virtual observations/);
    expect(field('Assumed slope b, per ln mg')).toHaveValue('0.3');
    const input = await saved();
    expect(input?.design.rule).toEqual({ name: 'virtual-observations', slope: 0.3, carryBounds: null });
  });

  it('offers every rule with settings that hold', async () => {
    for (const rule of designFormOffers(onLevels).rules) {
      const { choose, saved, form } = show();
      expect(form.getByText(`Source: ${rule.source}.`)).toBeInTheDocument();
      await choose(new RegExp(`^${rule.title}`));
      const input = await saved();
      expect(input?.design.rule).toEqual(rule.name === 'robbins-monro' ? gains : rule.fresh);
      document.body.replaceChildren();
    }
  });

  it('keeps levels and range beside each other, and rests the rule against skipping on a range', async () => {
    const { choose, retype, field, form, saved } = show();
    await retype('Level 6', '150');
    await choose(/^a range/);
    await retype('Increment, mg', '5');
    expect(form.getByRole('radio', { name: 'at most one level above the current one' })).not.toBeChecked();
    await choose(/^levels/);
    expect(field('Level 6')).toHaveValue('150');
    await choose(/^a range/);
    expect(field('Increment, mg')).toHaveValue('5');
    const input = await saved();
    expect(input?.design.doses).toEqual({ kind: 'range', lowest: '10', highest: '120', increment: '5' });
    expect(input?.design.guardrails.noSkipping).toBe('off');
  });

  it('refuses a dose of 0 on the log scale at its field', async () => {
    const { retype, field, form } = show();
    await retype('Level 1', '0');
    expect(await form.findByText(/A dose of 0 has no logarithm/)).toBeInTheDocument();
    expect(field('Level 1')).toHaveAttribute('aria-invalid', 'true');
  });

  it('sends null for optional entries left empty, and takes another unit by its code', async () => {
    const { user, form, field, saved, save, action } = show();
    await user.clear(field(/^Maximum of evaluable subjects/));
    await user.selectOptions(form.getByRole('combobox', { name: 'Unit' }), 'other');
    await user.type(field('UCUM code'), 'mcg');
    await save();
    expect(await form.findAllByText(/Enter ug\./)).not.toHaveLength(0);
    expect(action).not.toHaveBeenCalled();
    await user.clear(field('UCUM code'));
    await user.type(field('UCUM code'), 'pg');
    const input = await saved();
    expect(input?.design.unit).toBe('pg');
    expect(input?.design.stopping.maximumSubjects).toBeNull();
  });

  it('keeps everything typed when the server refuses, and shows the sentence at the field', async () => {
    const { retype, field, save, form } = show(onLevels, {
      ok: false,
      code: 'invalid',
      message: 'Not saved. One entry needs a change.',
      fields: { 'design.rule.c': 'The server’s own sentence.' },
    });
    await retype('Gain constant c, ln mg', '7.25');
    await save();
    expect(await screen.findByRole('alert')).toHaveTextContent('Not saved. One entry needs a change.');
    expect(field('Gain constant c, ln mg')).toHaveValue('7.25');
    const refused = () => field('Gain constant c, ln mg');
    expect(refused()).toHaveAccessibleDescription(/The server’s own sentence/);
    // A change elsewhere is checked meanwhile, and leaves the server's sentence standing.
    await retype('Target probability Γ', '2');
    expect(await form.findByText(/The target response probability Γ is 2/)).toBeInTheDocument();
    expect(refused()).toHaveAccessibleDescription(/The server’s own sentence/);
    await retype('Gain constant c, ln mg', '7');
    await waitFor(() => expect(refused()).not.toHaveAttribute('aria-invalid'));
  });
});

describe('the panel beside the form', { timeout: SLOW }, () => {
  const panel = () => screen.findByRole('complementary', { name: 'Consequences of the design' });

  /* a_1 = 4.5, target 0.25, from 10 mg on the ln scale: 10·e^(4.5 · 0.25) = 30.80 mg and 10·e^(−4.5 · 0.75) = 0.3422 mg (by hand). */
  it('shows the first ten steps in dose units, and follows what is typed', async () => {
    const { retype } = show();
    const table = await within(await panel()).findByRole('table', { name: 'The first 10 steps from 10 mg' });
    expect(within(table).getAllByRole('row')).toHaveLength(11);
    expect(within(table).getByRole('row', { name: /^1 / })).toHaveTextContent('30.8');
    expect(within(table).getByRole('row', { name: /^1 / })).toHaveTextContent('0.342');
    await retype('Gain constant c, ln mg', '2');
    await waitFor(async () => {
      const row = within(await panel()).getByRole('row', { name: /^1 2\.000/ });
      expect(row).toHaveTextContent('16.5');
    });
  });

  it('says what keeps the entries from holding together, and keeps the last consequences', async () => {
    const { retype } = show();
    const before = await panel();
    await retype('Gain constant c, ln mg', '-1');
    await waitFor(() => expect(before).toHaveTextContent('Shown for the last entries that held together.'));
    expect(within(before).getByRole('table', { name: 'The first 10 steps from 10 mg' })).toBeInTheDocument();
  });

  /* Logit through (20, 0.1) and (80, 0.5) on the ln scale: slope ln 9 / ln 4 = 1.585, D = 1.585 · 0.25 · 0.75 = 0.297, 1/D = 3.365 (by hand). */
  it('advises on a believed curve typed as two quantiles', async () => {
    const { user, retype } = show();
    const beside = within(await panel());
    const type = async (index: number, dose: string, probability: string) => {
      const doseField = beside.getByRole('textbox', {
        name: index === 0 ? 'At a dose of, mg' : 'and at, mg',
      });
      await user.clear(doseField);
      await user.type(doseField, dose);
      const probabilityField = beside.getAllByRole('textbox', { name: 'probability' })[index] as HTMLElement;
      await user.clear(probabilityField);
      await user.type(probabilityField, probability);
    };
    await type(0, '20', '0.1');
    await type(1, '80', '0.5');
    expect(beside.getByText('3.365 ln mg')).toBeInTheDocument();
    expect(beside.getByText(/^0\.297 per ln mg/)).toBeInTheDocument();
    await retype('Gain constant c, ln mg', '1.5');
    expect(await beside.findByText(/the rule converges too slowly/)).toBeInTheDocument();
    await type(1, '80', '0.05');
    expect(beside.getByText(/The probability does not rise with dose/)).toBeInTheDocument();
  });
});
