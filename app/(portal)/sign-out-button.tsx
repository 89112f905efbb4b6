import { signOut } from './actions';

/** The form that signs out, for the top bar. */
export function SignOutButton() {
  return (
    <form action={signOut}>
      <button type="submit" className="min-h-6 cursor-pointer text-water underline underline-offset-3">
        Sign out
      </button>
    </form>
  );
}
