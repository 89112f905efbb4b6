import { render, screen, waitFor } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { signIn } from 'next-auth/react';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { SignInForm } from './sign-in-form';

vi.mock('next-auth/react', () => ({ signIn: vi.fn() }));

const ACCOUNTS = [
  {
    email: 'lena@demo.example',
    password: 'quiet water below',
    printedName: 'Lena Okoro',
    description: 'Site coordinator',
  },
  {
    email: 'oke@demo.example',
    password: 'quiet water below',
    printedName: 'Oke Lindqvist',
    description: 'Safety reviewer',
  },
];
const assign = vi.fn();
const answer = (answered: Partial<Awaited<ReturnType<typeof signIn>>>) =>
  vi.mocked(signIn).mockResolvedValue({ ok: true, status: 200, error: null, url: '', ...answered } as never);

beforeEach(() => {
  vi.mocked(signIn).mockReset();
  assign.mockReset();
  vi.stubGlobal('location', { ...window.location, assign });
});

const address = () => screen.getByRole('textbox', { name: 'E-mail address' });
const password = () => screen.getByLabelText('Password');
const send = () => userEvent.click(screen.getByRole('button', { name: 'Sign in' }));

describe('the sign-in form', () => {
  it('sends address and password, and goes on to the page that was asked for', async () => {
    answer({});
    render(<SignInForm next="/trials/WELL-02" accounts={[]} />);
    await userEvent.type(address(), 'lena@demo.example');
    await userEvent.type(password(), 'quiet water below');
    await send();
    await waitFor(() => expect(assign).toHaveBeenCalledExactlyOnceWith('/trials/WELL-02'));
    expect(signIn).toHaveBeenCalledExactlyOnceWith('credentials', {
      email: 'lena@demo.example',
      password: 'quiet water below',
      redirect: false,
      callbackUrl: '/today',
    });
  });

  it('shows a refusal in its own words, keeps the address and empties the password', async () => {
    answer({ ok: false, status: 401, error: 'There were too many wrong passwords. Try again in 4 minutes.' });
    render(<SignInForm next="/today" accounts={[]} />);
    await userEvent.type(address(), 'lena@demo.example');
    await userEvent.type(password(), 'a guess');
    await send();
    expect(await screen.findByRole('alert')).toHaveTextContent('Try again in 4 minutes.');
    expect(address()).toHaveValue('lena@demo.example');
    expect(password()).toHaveValue('');
    expect(assign).not.toHaveBeenCalled();
  });

  it('sends nothing that is empty, and names both fields', async () => {
    render(<SignInForm next="/today" accounts={[]} />);
    await send();
    expect(await screen.findByRole('alert')).toHaveTextContent(/E-mail address.*Password/);
    expect(signIn).not.toHaveBeenCalled();
  });

  it('lets a password manager fill it in', () => {
    render(<SignInForm next="/today" accounts={[]} />);
    expect(address()).toHaveAttribute('autocomplete', 'username');
    expect(password()).toHaveAttribute('autocomplete', 'current-password');
  });

  it('lists no accounts where there is no demonstration', () => {
    render(<SignInForm next="/today" accounts={[]} />);
    expect(screen.queryByRole('heading', { name: 'Demonstration accounts' })).not.toBeInTheDocument();
  });

  it('fills in a demonstration account, and says whose', async () => {
    answer({});
    render(<SignInForm next="/today" accounts={ACCOUNTS} />);
    await userEvent.click(screen.getByRole('button', { name: 'Fill in the account of Oke Lindqvist' }));
    expect(address()).toHaveValue('oke@demo.example');
    expect(screen.getByText('Address and password of Oke Lindqvist are filled in.')).toBeInTheDocument();
    await send();
    await waitFor(() =>
      expect(signIn).toHaveBeenCalledWith(
        'credentials',
        expect.objectContaining({ email: 'oke@demo.example' }),
      ),
    );
  });
});
