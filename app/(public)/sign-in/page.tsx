import type { Metadata } from 'next';
import { redirect } from 'next/navigation';
import { SignInForm } from '@/components/account/sign-in-form';
import { Caution } from '@/components/caution/caution';
import { PageTitle } from '@/components/layout/page-title';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { Notice } from '@/components/ui/notice';
import { demoAccounts } from '@/lib/queries/demo-accounts';
import { nextAddress } from '@/lib/schemas/sign-in';
import { currentReader } from '@/lib/server/session';

export const metadata: Metadata = { title: 'Sign in' };

interface Props {
  readonly searchParams: Promise<Record<string, string | string[] | undefined>>;
}

/** Why the visitor is here, when the address says so. */
function Arrival({ because }: { because: string | string[] | undefined }) {
  const words: Record<string, string> = {
    'signed-out': 'You are signed out.',
    ended: 'Your session has ended. Sign in to go on where you were.',
    'password-set': 'Your password is set. Sign in with it.',
    'password-changed': 'Your password is changed. Sign in with the new one.',
  };
  const sentence = typeof because === 'string' && Object.hasOwn(words, because) ? words[because] : undefined;
  if (sentence === undefined) return null;
  return (
    <div className="mb-5">
      <Notice kind={because === 'ended' ? 'note' : 'saved'} live={false}>
        {sentence}
      </Notice>
    </div>
  );
}

/** Where everybody comes in. Who is signed in already goes on. */
export default async function SignInPage({ searchParams }: Props) {
  const { next, because } = await searchParams;
  const target = nextAddress(next);
  if ((await currentReader()) !== null) redirect(target);
  return (
    <Sheet
      caution={<Caution />}
      margin={
        <MarginNote title="No account?">
          <p>An administrator of your installation invites people by e-mail. The link works once.</p>
        </MarginNote>
      }
    >
      <PageTitle lede="Stepwell takes a multi-site dose-finding trial from one cohort to the next: dose released, outcomes recorded, next dose calculated, reviewed and signed.">
        Sign in
      </PageTitle>
      <Arrival because={because} />
      <SignInForm next={target} accounts={await demoAccounts()} />
    </Sheet>
  );
}
