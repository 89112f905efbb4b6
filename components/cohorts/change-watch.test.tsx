import { act, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ChangeWatch } from './change-watch';

vi.mock('next/navigation', async (original) => ({
  ...(await original<object>()),
  useRouter: () => ({ refresh: vi.fn() }),
}));

const answers = vi.fn<typeof fetch>();
beforeEach(() => {
  vi.useFakeTimers({ shouldAdvanceTime: true });
  vi.stubGlobal('fetch', answers.mockReset());
});
afterEach(() => {
  vi.useRealTimers();
  vi.unstubAllGlobals();
});

const SHOWN = 'a'.repeat(64);
const later = (milliseconds: number) => act(() => vi.advanceTimersByTimeAsync(milliseconds));
const show = () => render(<ChangeWatch trialCode="WELL-99" cohortNumber={3} revision={SHOWN} />);

describe('the watch on a cohort', () => {
  it('asks nothing before twenty seconds, and says nothing while the cohort is as shown', async () => {
    answers.mockImplementation(async () => Response.json({ number: 3, revision: SHOWN }));
    show();
    await later(19_000);
    expect(answers).not.toHaveBeenCalled();
    await later(2_000);
    await vi.waitFor(() => expect(answers).toHaveBeenCalledTimes(1), 5_000);
    expect(answers.mock.calls[0]?.[0]).toBe('/api/trials/WELL-99/cohorts/3');
    await vi.waitFor(async () => {
      await later(5_000);
      expect(answers.mock.calls.length).toBeGreaterThan(1);
    }, 4_000);
    expect(screen.getByRole('status')).toBeEmptyDOMElement();
  });

  it('says that somebody else changed it, with a button that shows the new state', async () => {
    answers.mockImplementation(async () => Response.json({ number: 3, revision: 'b'.repeat(64) }));
    show();
    await later(21_000);
    expect(await screen.findByText('Somebody else changed this cohort.')).toBeInTheDocument();
    expect(screen.getByRole('button', { name: 'Show the new state' })).toBeEnabled();
  });

  it('says when there is no connection, and when the reader is signed out', async () => {
    answers.mockRejectedValue(new TypeError('fetch failed'));
    const { unmount } = show();
    await later(21_000);
    expect(
      await screen.findByText('No connection to the server.', {}, { timeout: 5_000 }),
    ).toBeInTheDocument();
    unmount();
    answers.mockImplementation(async () => new Response(null, { status: 401 }));
    show();
    await later(21_000);
    expect(await screen.findByText(/^You are signed out/, {}, { timeout: 5_000 })).toBeInTheDocument();
  });
});
