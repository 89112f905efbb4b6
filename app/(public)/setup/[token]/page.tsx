import type { Metadata } from 'next';
import { LinkForm } from '@/components/account/link-form';
import { DeadLinkPage, LinkPageFrame } from '@/components/account/link-page';
import { linkPage } from '@/lib/queries/one-time-link';
import { requestTime } from '@/lib/server/request-time';
import { acceptLink } from '../../actions';

export const metadata: Metadata = { title: 'Create the first administrator', referrer: 'no-referrer' };

/** Where a new installation gets its first administrator. */
export default async function Page({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const link = await linkPage('first-administrator', token, await requestTime());
  if (!link.works) return <DeadLinkPage title="Create the first administrator" message={link.message} />;
  return (
    <LinkPageFrame
      title="Create the first administrator"
      lede="The administrator invites people, creates sites and trials, and sees no clinical data."
      email={link.person?.email}
      expiresAt={link.expiresAt}
    >
      <LinkForm purpose="first-administrator" token={token} person={link.person} action={acceptLink} />
    </LinkPageFrame>
  );
}
