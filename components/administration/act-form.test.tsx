import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import type { ActionResult } from '@/lib/schemas/action-result';
import { ActForm } from './act-form';

const refresh = vi.fn();
vi.mock('next/navigation', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ refresh }),
}));
beforeEach(() => refresh.mockClear());

const personId = '01890a5d-ac96-774b-bcce-b302099a8057';

function show(...answers: (ActionResult<unknown> | Error)[]) {
  const action = vi.fn();
  for (const answer of answers) {
    if (answer instanceof Error) action.mockRejectedValueOnce(answer);
    else action.mockResolvedValueOnce(answer);
  }
  render(
    <ActForm
      act="disable-person"
      values={{ personId }}
      action={action}
      name="Disable the account of Lena Okoro"
      label="Disable account"
      pendingLabel="Disabling…"
      saved="It is disabled."
    />,
  );
  const act = () => userEvent.click(screen.getByRole('button', { name: 'Disable account' }));
  return { action, act };
}

describe('an act without entries', () => {
  it('is a form by its record’s name, sends the ids, says that it is done and reads anew', async () => {
    const { action, act } = show({ ok: true, value: null });
    expect(screen.getByRole('form', { name: 'Disable the account of Lena Okoro' })).toBeInTheDocument();
    await act();
    expect(await screen.findByText('It is disabled.')).toBeInTheDocument();
    expect(action).toHaveBeenCalledExactlyOnceWith({ personId, submissionKey: expect.any(String) });
    expect(refresh).toHaveBeenCalledTimes(1);
  });

  it('says and focuses what stands in the way', async () => {
    const { act } = show({
      ok: false,
      code: 'refused',
      message: 'Not done. The account is disabled already.',
      reference: 'R-7',
    });
    await act();
    const alert = await screen.findByRole('alert');
    expect(alert).toHaveTextContent('Not done. The account is disabled already.');
    expect(alert).toHaveTextContent('Reference R-7');
    await waitFor(() => expect(alert.parentElement).toHaveFocus());
    expect(refresh).not.toHaveBeenCalled();
  });

  it('offers a signed-out administrator to sign in beside it', async () => {
    const { act } = show({ ok: false, code: 'signed-out', message: 'You are signed out.' });
    await act();
    expect(await screen.findByRole('link', { name: 'Sign in in another tab' })).toHaveAttribute(
      'href',
      '/sign-in',
    );
  });

  it('keeps its key when no answer came, so that sent again it is recorded once', async () => {
    const { action, act } = show(new Error('no connection'), { ok: true, value: null });
    await act();
    expect(await screen.findByRole('alert')).toHaveTextContent('No answer came from the server');
    await act();
    await screen.findByText('It is disabled.');
    const keys = action.mock.calls.map(([input]) => (input as { submissionKey: string }).submissionKey);
    expect(new Set(keys).size).toBe(1);
    expect(screen.queryByRole('alert')).toBeNull();
  });

  it('takes no second click while it is under way', async () => {
    let answer: (result: ActionResult<unknown>) => void = () => undefined;
    const action = vi.fn(() => new Promise<ActionResult<unknown>>((resolve) => (answer = resolve)));
    render(
      <ActForm
        act="retry-mail"
        values={{ mailId: personId }}
        action={action}
        name="Send again"
        label="Send again"
        pendingLabel="Sending…"
      />,
    );
    const button = screen.getByRole('button');
    await userEvent.dblClick(button);
    expect(button).toHaveTextContent('Sending…');
    expect(action).toHaveBeenCalledTimes(1);
    answer({ ok: true, value: null });
    await waitFor(() => expect(button).toHaveTextContent('Send again'));
  });
});
