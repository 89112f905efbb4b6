import type { Metadata } from 'next';
import { LinkForm } from '@/components/account/link-form';
import { DeadLinkPage, LinkPageFrame } from '@/components/account/link-page';
import { linkPage } from '@/lib/queries/one-time-link';
import { requestTime } from '@/lib/server/request-time';
import { acceptLink } from '../../actions';

export const metadata: Metadata = { title: 'Accept the invitation', referrer: 'no-referrer' };

/** Where an invited person chooses a password and checks their printed name. */
export default async function Page({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const link = await linkPage('invitation', token, await requestTime());
  if (!link.works) return <DeadLinkPage title="Accept the invitation" message={link.message} />;
  return (
    <LinkPageFrame
      title="Accept the invitation"
      lede="Choose a password; with it and your e-mail address you sign in, and you sign."
      email={link.person?.email}
      expiresAt={link.expiresAt}
    >
      <LinkForm purpose="invitation" token={token} person={link.person} action={acceptLink} />
    </LinkPageFrame>
  );
}
