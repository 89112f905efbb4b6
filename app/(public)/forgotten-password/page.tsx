import type { Metadata } from 'next';
import { ForgottenPasswordForm } from '@/components/account/forgotten-password-form';
import { PageTitle } from '@/components/layout/page-title';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { requestPasswordReset } from '../actions';

export const metadata: Metadata = { title: 'Forgotten password' };

/** Where a link for a new password is asked for. */
export default function ForgottenPasswordPage() {
  return (
    <Sheet
      margin={
        <MarginNote title="No mail?">
          <p>Look among unwanted mail, or ask an administrator of your installation for a new link.</p>
        </MarginNote>
      }
    >
      <PageTitle lede="Enter your e-mail address. If it belongs to an account, a link to choose a new password is sent there; it works once, for 24 hours.">
        Forgotten password
      </PageTitle>
      <ForgottenPasswordForm action={requestPasswordReset} />
    </Sheet>
  );
}
