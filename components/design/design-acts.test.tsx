import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { ApproveDesignForm } from './approve-design-form';
import { ReturnDesignForm } from './return-design-form';
import { SubmitDesignForm } from './submit-design-form';

const refresh = vi.fn();
vi.mock('next/navigation', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ refresh }),
}));
beforeEach(() => refresh.mockClear());

const versionId = '0b8e5a3e-6d4f-4c2b-9a1e-1f2d3c4b5a69';
const seenDigest = 'a'.repeat(64);
const saving = () => vi.fn(async () => ({ ok: true as const, value: null }));

describe('submitting a design', () => {
  it('sends the version that was read', async () => {
    const user = userEvent.setup({ delay: null });
    const action = saving();
    render(<SubmitDesignForm trialCode="WELL-99" versionId={versionId} why={null} action={action} />);
    await user.click(screen.getByRole('button', { name: 'Submit for approval' }));
    await waitFor(() => expect(refresh).toHaveBeenCalled());
    expect(action).toHaveBeenCalledExactlyOnceWith({
      trialCode: 'WELL-99',
      versionId,
      submissionKey: expect.any(String),
    });
  });

  it('says why it is not possible', () => {
    const why = 'No active site has a coordinator. Ask an administrator to add one.';
    render(<SubmitDesignForm trialCode="WELL-99" versionId={versionId} why={why} action={saving()} />);
    const button = screen.getByRole('button', { name: 'Submit for approval' });
    expect(button).toBeDisabled();
    expect(button).toHaveAccessibleDescription(why);
  });
});

describe('deciding on a submitted design', () => {
  it('approves with the digest that was read, by address and password', async () => {
    const user = userEvent.setup({ delay: null });
    const action = saving();
    const meaning = 'I have reviewed design version 2 of WELL-99 and approve it.';
    render(
      <ApproveDesignForm
        version={{ trialCode: 'WELL-99', versionId, seenDigest, number: 2 }}
        printedName="Dr Rhea Tarn"
        meaning={meaning}
        action={action}
      />,
    );
    expect(screen.getByText(`By signing, Dr Rhea Tarn states: “${meaning}”`)).toBeInTheDocument();
    await user.click(screen.getByRole('button', { name: 'Sign and approve version 2' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('2 entries need a change');
    expect(action).not.toHaveBeenCalled();
    await user.type(screen.getByLabelText('Your e-mail address'), 'rhea@example.org');
    await user.type(screen.getByLabelText('Your password'), 'a long password');
    await user.click(screen.getByRole('button', { name: 'Sign and approve version 2' }));
    await waitFor(() => expect(refresh).toHaveBeenCalled());
    expect(action).toHaveBeenCalledExactlyOnceWith({
      trialCode: 'WELL-99',
      versionId,
      seenDigest,
      email: 'rhea@example.org',
      password: 'a long password',
      submissionKey: expect.any(String),
    });
  });

  it('returns to draft with a reason, which it keeps when refused', async () => {
    const user = userEvent.setup({ delay: null });
    const action = vi.fn(async () => ({
      ok: false as const,
      code: 'conflict',
      message: 'Load the page again.',
    }));
    render(<ReturnDesignForm trialCode="WELL-99" versionId={versionId} action={action} />);
    await user.click(screen.getByRole('button', { name: 'Return to draft' }));
    await user.type(screen.getByLabelText('Reason'), 'State the largest rise.');
    await user.click(screen.getByRole('button', { name: 'Return to draft' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Load the page again.');
    expect(screen.getByLabelText('Reason')).toHaveValue('State the largest rise.');
    expect(action).toHaveBeenCalledExactlyOnceWith({
      trialCode: 'WELL-99',
      versionId,
      reason: 'State the largest rise.',
      submissionKey: expect.any(String),
    });
  });
});
