import { act, fireEvent, render, screen } from '@testing-library/react';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { SessionWatch } from './session-watch';
// The watch fetches this when it needs it; under a clock that stands still it must be there already.
import '@/lib/schemas/account';

const MINUTE = 60_000;
const NOW = Date.UTC(2027, 2, 1, 12);
const fetched = vi.fn<(url: string, options: RequestInit) => Promise<Response>>();
const left = (milliseconds: number) => () =>
  Promise.resolve(
    Response.json({ endsAt: new Date(NOW + milliseconds).toISOString(), now: new Date(NOW).toISOString() }),
  );
const ended = () => Promise.resolve(new Response(null, { status: 401 }));
const pass = (milliseconds: number) =>
  act(async () => {
    await vi.advanceTimersByTimeAsync(milliseconds);
    await vi.dynamicImportSettled();
  });

beforeEach(() => {
  vi.useFakeTimers();
  fetched.mockReset();
  vi.stubGlobal('fetch', fetched);
});
afterEach(() => {
  vi.useRealTimers();
});

describe('the watch over the session', () => {
  it('asks nothing before the warning is due, and then without prolonging the session', async () => {
    fetched.mockImplementation(left(2 * MINUTE));
    render(<SessionWatch left={30 * MINUTE} />);
    await pass(28 * MINUTE - 1);
    expect(fetched).not.toHaveBeenCalled();
    await pass(1);
    expect(fetched).toHaveBeenCalledExactlyOnceWith('/api/session', { method: 'GET', cache: 'no-store' });
  });

  it('says nothing when another page has prolonged the session, and looks again later', async () => {
    fetched.mockImplementation(left(20 * MINUTE));
    render(<SessionWatch left={30 * MINUTE} />);
    await pass(28 * MINUTE);
    expect(screen.queryByRole('status')).not.toBeInTheDocument();
    await pass(18 * MINUTE);
    expect(fetched).toHaveBeenCalledTimes(2);
  });

  it('warns at least 20 seconds before, and prolongs by one act (WCAG 2.2, 2.2.1)', async () => {
    fetched.mockImplementation(left(2 * MINUTE));
    render(<SessionWatch left={30 * MINUTE} />);
    await pass(28 * MINUTE);
    expect(screen.getByRole('status')).toHaveTextContent('Your session ends in less than two minutes.');
    fetched.mockImplementation(left(30 * MINUTE));
    fireEvent.click(screen.getByRole('button', { name: 'Stay signed in' }));
    await pass(0);
    expect(fetched).toHaveBeenLastCalledWith('/api/session', { method: 'POST', cache: 'no-store' });
    expect(screen.queryByRole('status')).not.toBeInTheDocument();
  });

  it('says so when the twelve hours are over', async () => {
    fetched.mockImplementation(left(MINUTE));
    render(<SessionWatch left={30 * MINUTE} />);
    await pass(28 * MINUTE);
    fireEvent.click(screen.getByRole('button', { name: 'Stay signed in' }));
    await pass(0);
    expect(screen.getByRole('status')).toHaveTextContent('It is twelve hours since you signed in.');
  });

  it('says when the session has ended, with where to sign in again', async () => {
    fetched.mockImplementation(ended);
    render(<SessionWatch left={0} />);
    await pass(5_000);
    expect(screen.getByRole('alert')).toHaveTextContent('What you typed on this page is still here.');
    expect(screen.getByRole('link', { name: 'Sign in in another tab' })).toHaveAttribute('target', '_blank');
    await pass(10 * MINUTE);
    expect(fetched).toHaveBeenCalledTimes(1);
  });

  it('claims nothing while the server does not answer, and goes on asking', async () => {
    fetched.mockRejectedValue(new TypeError('no network'));
    render(<SessionWatch left={2 * MINUTE} />);
    await pass(MINUTE);
    expect(screen.queryByRole('alert')).not.toBeInTheDocument();
    expect(fetched.mock.calls.length).toBeGreaterThanOrEqual(4);
  });
});
