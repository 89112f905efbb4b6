import type { Metadata } from 'next';
import { PageLink } from '@/components/ui/page-link';
import { notFound } from 'next/navigation';
import { TextWithLinks } from '@/components/caught-mail/text-with-links';
import { PageTitle } from '@/components/layout/page-title';
import { Section } from '@/components/layout/section';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { TimeInZone } from '@/components/ui/time-in-zone';
import { environment } from '@/lib/env';
import { caughtMail } from '@/lib/queries/caught-mails';
import { caughtMailIdSchema, caughtMailListPath } from '@/lib/schemas/caught-mail-address';

/** A mail may hold a link that works once: what is opened from here does not learn where it was. */
export const metadata: Metadata = { title: 'Caught mail', referrer: 'no-referrer' };

/** One caught mail: its HTML in a frame that runs nothing and fetches nothing, and its text. */
export default async function CaughtMailPage({ params }: { params: Promise<{ id: string }> }) {
  const id = caughtMailIdSchema.safeParse((await params).id);
  const mail = id.success ? await caughtMail(id.data) : null;
  if (mail === null) notFound();
  return (
    <Sheet
      margin={
        <>
          <MarginNote title="To">
            <p>
              <PageLink href={caughtMailListPath({ to: mail.to })}>{mail.to}</PageLink>
            </p>
          </MarginNote>
          <MarginNote title="Caught">
            <p>
              <TimeInZone at={mail.receivedAt} />
            </p>
          </MarginNote>
          <p className="text-sm">
            <PageLink href="/caught-mail">All caught mail</PageLink>
          </p>
        </>
      }
    >
      <PageTitle>{mail.subject || 'No subject'}</PageTitle>
      {mail.html === '' ? null : (
        <Section title="As HTML">
          <iframe
            src={`/caught-mail/${mail.id}/html`}
            title="The mail as HTML"
            sandbox="allow-popups allow-popups-to-escape-sandbox"
            className="h-[60rem] w-full border border-line"
          />
        </Section>
      )}
      <Section title="As text">
        <TextWithLinks text={mail.text} url={environment().url} />
      </Section>
    </Sheet>
  );
}
