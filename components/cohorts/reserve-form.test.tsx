import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { answering, recorded } from '@/tests/factories/cohort-work';
import { ReserveForm } from './reserve-form';
import { SavedNoticeProvider } from './saved-notice';

vi.mock('next/navigation', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ refresh: vi.fn() }),
}));

const sites = [
  { id: '0190a000-0000-7000-8000-00000000000a', name: 'Aldermoor Hospital', code: 'ALD' },
  { id: '0190a000-0000-7000-8000-00000000000b', name: 'Valk Institute', code: 'VLK' },
];
const cohortId = '0190a000-0000-7000-8000-0000000000c0';

function show(of: typeof sites, why: string | null = null) {
  const actions = answering(recorded);
  render(
    <SavedNoticeProvider>
      <ReserveForm
        trialCode="WELL-99"
        cohortId={cohortId}
        sites={of}
        spot="place-1"
        action={actions.reserveSlot}
        isPrimary
        why={why}
      />
    </SavedNoticeProvider>,
  );
  return { actions, user: userEvent.setup({ delay: null }) };
}

describe('reserving a place', () => {
  it('asks for the code alone where there is one site, and shows its pattern', async () => {
    const { actions, user } = show(sites.slice(0, 1));
    expect(screen.queryByLabelText('Site')).toBeNull();
    expect(screen.getByText(/such as ALD-014/)).toBeInTheDocument();
    await user.type(screen.getByLabelText('Subject code'), 'ALD-021');
    await user.click(screen.getByRole('button', { name: 'Reserve a place' }));
    await waitFor(() => expect(actions.reserveSlot).toHaveBeenCalledTimes(1));
    expect(actions.reserveSlot.mock.calls[0]?.[0]).toMatchObject({
      trialCode: 'WELL-99',
      cohortId,
      siteId: sites[0]?.id,
      code: 'ALD-021',
    });
    expect(screen.getByLabelText('Subject code')).toHaveValue('');
  });

  it('wants a site where there are several', async () => {
    const { actions, user } = show(sites);
    await user.type(screen.getByLabelText('Subject code'), 'VLK-009');
    await user.click(screen.getByRole('button', { name: 'Reserve a place' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Choose the site.');
    expect(actions.reserveSlot).not.toHaveBeenCalled();
    await user.selectOptions(screen.getByLabelText('Site'), 'Valk Institute');
    expect(screen.getByText(/such as VLK-014/)).toBeInTheDocument();
    await user.click(screen.getByRole('button', { name: 'Reserve a place' }));
    await waitFor(() => expect(actions.reserveSlot).toHaveBeenCalledTimes(1));
    expect(actions.reserveSlot.mock.calls[0]?.[0]).toMatchObject({ siteId: sites[1]?.id });
  });

  it.each(['Maria Sample', 'ald-014', '1961-04-12', 'm.sample@example.org', 'ALD-014\u202e', 'A'.repeat(40)])(
    'refuses %j as a code and keeps it',
    async (code) => {
      const { actions, user } = show(sites.slice(0, 1));
      await user.type(screen.getByLabelText('Subject code'), code);
      await user.click(screen.getByRole('button', { name: 'Reserve a place' }));
      expect(await screen.findByRole('alert')).toHaveTextContent('no name, no birth date');
      expect(screen.getByLabelText('Subject code')).toHaveValue(code);
      expect(actions.reserveSlot).not.toHaveBeenCalled();
    },
  );

  it('says why no place may be reserved', () => {
    show(sites.slice(0, 1), 'The trial is halted: nobody is reserved or dosed until it is lifted.');
    expect(screen.getByRole('button', { name: 'Reserve a place' })).toBeDisabled();
    expect(screen.getByText(/^The trial is halted/)).toBeInTheDocument();
  });
});
