import type { Metadata } from 'next';
import { LinkForm } from '@/components/account/link-form';
import { DeadLinkPage, LinkPageFrame } from '@/components/account/link-page';
import { linkPage } from '@/lib/queries/one-time-link';
import { requestTime } from '@/lib/server/request-time';
import { acceptLink } from '../../actions';

export const metadata: Metadata = { title: 'Choose a new password', referrer: 'no-referrer' };

/** Where somebody who forgot their password chooses a new one. */
export default async function Page({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const link = await linkPage('password-reset', token, await requestTime());
  if (!link.works) return <DeadLinkPage title="Choose a new password" message={link.message} />;
  return (
    <LinkPageFrame
      title="Choose a new password"
      lede="Every session of this account ends when the new password is set."
      email={link.person?.email}
      expiresAt={link.expiresAt}
    >
      <LinkForm purpose="password-reset" token={token} person={link.person} action={acceptLink} />
    </LinkPageFrame>
  );
}
