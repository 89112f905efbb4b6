import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { useFieldArray } from 'react-hook-form';
import { describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import type { ActionResult, Submission } from '@/lib/schemas/action-result';
import { ActionForm } from './action-form';
import { Checkbox } from './checkbox-fields';
import { RadioGroup } from './choice-fields';
import { GroupError } from './group-error';
import { DecimalField, NumberField } from './number-field';
import { PasswordField } from './password-field';
import { SubmitButton } from './submit-button';
import { TextArea, TextField } from './text-field';
import { useActionForm } from './use-action-form';

const schema = z.object({
  code: z.string().min(1, 'Enter the code.'),
  password: z.string().min(1, 'Enter your password.'),
  target: z.number({ error: 'The target is missing.' }).lt(1, { error: 'The target must be below 1.' }),
  limit: z.number().optional(),
  decision: z.enum(['release', 'stop'], { error: 'Choose a decision.' }),
  confirmed: z.boolean().refine((value) => value, 'Confirm the consent.'),
  note: z.string(),
  doses: z.object({
    levels: z
      .array(z.object({ dose: z.string().min(1, 'Enter the dose.') }))
      .refine((levels) => levels.length < 4, 'At most three levels.'),
  }),
});
type Input = z.input<typeof schema> & Submission;
type Action = (input: Input) => Promise<ActionResult<{ number: number }>>;

const saved: ActionResult<{ number: number }> = { ok: true, value: { number: 4 } };
const refused: ActionResult<{ number: number }> = {
  ok: false,
  code: 'window-not-ended',
  message: 'Not recorded. The window ends on 14 March 2027.',
  fields: { code: 'This code is taken.', 'doses.levels.1.dose': 'This level is closed.' },
  reference: 'r-17',
};

function Levels({
  form,
}: {
  form: ReturnType<typeof useActionForm<typeof schema, { number: number }>>['form'];
}) {
  const { fields, append } = useFieldArray({ control: form.control, name: 'doses.levels' });
  return (
    <>
      {fields.map(({ id }, index) => (
        <DecimalField key={id} name={`doses.levels.${index}.dose`} label={`Level ${index + 1}`} unit="mg" />
      ))}
      <GroupError name="doses.levels" label="Levels" />
      <button type="button" onClick={() => append({ dose: '40' })}>
        Add a level
      </button>
    </>
  );
}

function Form({
  action,
  lazily = false,
  fail = false,
}: {
  action: Action;
  lazily?: boolean;
  fail?: boolean;
}) {
  const fetched = () => (fail ? Promise.reject(new Error('no connection')) : Promise.resolve(schema));
  const state = useActionForm({
    schema: lazily ? fetched : schema,
    action,
    defaultValues: {
      code: '',
      password: '',
      target: '' as never,
      limit: '' as never,
      decision: '' as never,
      confirmed: false,
      note: '',
      doses: { levels: [{ dose: '10' }, { dose: '20' }] },
    },
  });
  return (
    <ActionForm state={state} label="Record" saved={({ number }) => `Recorded as ${number}.`}>
      <TextField name="code" label="Subject code" help="No names." />
      <PasswordField name="password" label="Password" autoComplete="off" />
      <NumberField name="target" label="Target" />
      <NumberField name="limit" label="Limit" optional />
      <RadioGroup
        name="decision"
        label="Decision"
        choices={[
          { value: 'release', label: 'Release', help: 'Slots open.' },
          { value: 'stop', label: 'Stop', disabledReason: 'Another reviewer is first.' },
        ]}
      />
      <Checkbox name="confirmed" label="Consent confirmed" />
      <TextArea name="note" label="Note" optional />
      <Levels form={state.form} />
      <SubmitButton pendingLabel="Recording…">Record outcome</SubmitButton>
    </ActionForm>
  );
}

async function paste(user: ReturnType<typeof userEvent.setup>, label: string, text: string) {
  await user.click(screen.getByLabelText(label));
  await user.paste(text);
}

async function fill(user: ReturnType<typeof userEvent.setup>) {
  await paste(user, 'Subject code', 'ALD-014');
  await paste(user, 'Password', 'a long password');
  await user.type(screen.getByLabelText('Target'), '0.25');
  await user.click(screen.getByRole('radio', { name: /^Release/ }));
  await user.click(screen.getByRole('checkbox', { name: 'Consent confirmed' }));
}
async function send(user: ReturnType<typeof userEvent.setup>) {
  await user.click(await screen.findByRole('button', { name: 'Record outcome' }));
}

describe('a form over a server action', { timeout: 20_000 }, () => {
  it('does not send what the schema refuses; the summary takes the focus and leads to the fields', async () => {
    const action = vi.fn<Action>();
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} />);
    await send(user);
    const summary = await screen.findByRole('alert');
    await waitFor(() => expect(summary).toHaveFocus());
    expect(summary).toHaveTextContent('Not sent. 5 entries need a change.');
    expect(action).not.toHaveBeenCalled();

    const code = screen.getByLabelText('Subject code');
    expect(code).toBeInvalid();
    expect(code).toHaveAccessibleDescription('Enter the code. No names.');
    await user.click(within(summary).getByRole('link', { name: 'Subject code' }));
    expect(code).toHaveFocus();
    await user.click(within(summary).getByRole('link', { name: 'Decision' }));
    expect(screen.getByRole('radio', { name: /^Release/ })).toHaveFocus();

    await user.type(code, 'ALD-014');
    await waitFor(() => expect(summary).toHaveTextContent('4 entries need a change.'));
    expect(code).toBeValid();
  });

  it('sends the values as typed with a submission key, and says that they are recorded', async () => {
    const action = vi.fn<Action>().mockResolvedValue(saved);
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} />);
    await fill(user);
    await send(user);
    expect(await screen.findByText('Recorded as 4.')).toBeInTheDocument();
    expect(action).toHaveBeenCalledExactlyOnceWith({
      code: 'ALD-014',
      password: 'a long password',
      target: 0.25,
      limit: undefined,
      decision: 'release',
      confirmed: true,
      note: '',
      doses: { levels: [{ dose: '10' }, { dose: '20' }] },
      submissionKey: expect.stringMatching(/^[0-9a-f-]{36}$/),
    });
  });

  it('keeps everything typed after a refusal, except the password, and shows it beside the fields', async () => {
    const action = vi.fn<Action>().mockResolvedValue(refused);
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} />);
    await fill(user);
    await send(user);
    const summary = await screen.findByRole('alert');
    await waitFor(() => expect(summary).toHaveFocus());
    expect(summary).toHaveTextContent('Not recorded. The window ends on 14 March 2027.');
    expect(summary).toHaveTextContent('Level 2, mg: This level is closed.');
    expect(summary).toHaveTextContent('Reference r-17');
    expect(screen.getByLabelText('Subject code')).toHaveValue('ALD-014');
    expect(screen.getByLabelText('Subject code')).toHaveAccessibleDescription(
      'This code is taken. No names.',
    );
    expect(screen.getByLabelText('Level 2, mg')).toHaveAccessibleDescription('This level is closed.');
    expect(screen.getByLabelText('Target')).toHaveValue('0.25');
    expect(screen.getByRole('radio', { name: /^Release/ })).toBeChecked();
    expect(screen.getByLabelText('Password')).toHaveValue('');
  });

  it('sends once however often it is clicked, and keeps its key until it has succeeded', async () => {
    let answer: (result: ActionResult<{ number: number }>) => void = () => {};
    const action = vi.fn<Action>(() => new Promise((resolve) => (answer = resolve)));
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} />);
    await fill(user);
    const button = screen.getByRole('button', { name: 'Record outcome' });
    await user.dblClick(button);
    expect(await screen.findByRole('button', { name: 'Recording…' })).toBeDisabled();
    expect(action).toHaveBeenCalledTimes(1);

    answer({ ok: false, code: 'busy', message: 'Not recorded. Try again.' });
    await screen.findByRole('alert');
    await paste(user, 'Password', 'a long password');
    await send(user);
    await waitFor(() => expect(action).toHaveBeenCalledTimes(2));
    answer(saved);
    await screen.findByText('Recorded as 4.');
    await paste(user, 'Password', 'a long password');
    await send(user);
    await waitFor(() => expect(action).toHaveBeenCalledTimes(3));
    answer(saved);
    const [first, second, third] = action.mock.calls.map(([{ submissionKey }]) => submissionKey);
    expect(second).toBe(first);
    expect(third).not.toBe(first);
  });

  it('says that no answer came when the connection fails, and keeps what was typed', async () => {
    const action = vi.fn<Action>().mockRejectedValue(new TypeError('fetch failed'));
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} />);
    await fill(user);
    await send(user);
    expect(await screen.findByRole('alert')).toHaveTextContent('No answer came from the server');
    expect(screen.getByLabelText('Subject code')).toHaveValue('ALD-014');
    expect(await screen.findByRole('button', { name: 'Record outcome' })).toBeEnabled();
  });

  it('refuses a decimal comma with a sentence instead of guessing, and leaves it in the field', async () => {
    const action = vi.fn<Action>();
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} />);
    await fill(user);
    const target = screen.getByLabelText('Target');
    await user.clear(target);
    await user.type(target, '0,25');
    await send(user);
    await waitFor(() =>
      expect(target).toHaveAccessibleDescription('Write a point, not a comma: 0.25 instead of 0,25.'),
    );
    expect(target).toHaveValue('0,25');
    expect(action).not.toHaveBeenCalled();
  });

  it('shows what is wrong with a list as a whole', async () => {
    const user = userEvent.setup({ delay: null });
    render(<Form action={vi.fn<Action>()} />);
    await fill(user);
    await user.click(screen.getByRole('button', { name: 'Add a level' }));
    await user.click(screen.getByRole('button', { name: 'Add a level' }));
    await send(user);
    expect(await screen.findByRole('alert')).toHaveTextContent('Levels: At most three levels.');
  });

  it('checks by a schema that is fetched when the form is used', async () => {
    const action = vi.fn<Action>();
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} lazily />);
    await send(user);
    expect(await screen.findByRole('alert')).toHaveTextContent('Enter the code.');
    expect(action).not.toHaveBeenCalled();
  });

  it('leaves the check to the action when the schema cannot be fetched', async () => {
    const action = vi.fn<Action>().mockResolvedValue(refused);
    const user = userEvent.setup({ delay: null });
    render(<Form action={action} lazily fail />);
    await send(user);
    expect(await screen.findByRole('alert')).toHaveTextContent('Not recorded.');
    expect(action).toHaveBeenCalledTimes(1);
  });

  it('offers no choice that has a reason against it, and shows the reason', () => {
    render(<Form action={vi.fn<Action>()} />);
    expect(screen.getByRole('radio', { name: /^Stop/ })).toBeDisabled();
    expect(screen.getByText('Another reviewer is first.')).toBeVisible();
  });

  it('takes a pasted password, and shows it when asked', async () => {
    const user = userEvent.setup({ delay: null });
    render(<Form action={vi.fn<Action>()} />);
    const password = screen.getByLabelText('Password');
    await user.click(password);
    await user.paste('from a safe');
    expect(password).toHaveValue('from a safe');
    expect(password).toHaveAttribute('type', 'password');
    await user.click(screen.getByRole('button', { name: 'Show password' }));
    expect(password).toHaveAttribute('type', 'text');
  });
});
