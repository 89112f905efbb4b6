import type { ReactNode } from 'react';
import { PageTitle } from '@/components/layout/page-title';
import { MarginNote, Sheet } from '@/components/layout/sheet';
import { Notice } from '@/components/ui/notice';
import { TimeInZone } from '@/components/ui/time-in-zone';

/** The page of a single-use link that works: what it is for, whose it is, until when. */
export function LinkPageFrame({
  title,
  lede,
  email,
  expiresAt,
  children,
}: {
  title: string;
  lede: string;
  email?: string;
  expiresAt: string;
  children: ReactNode;
}) {
  return (
    <Sheet
      margin={
        <>
          {email ? (
            <MarginNote title="Account">
              <p className="break-words">{email}</p>
            </MarginNote>
          ) : null}
          <MarginNote title="This link">
            <p>
              It works once, until <TimeInZone at={expiresAt} />.
            </p>
          </MarginNote>
        </>
      }
    >
      <PageTitle lede={lede}>{title}</PageTitle>
      {children}
    </Sheet>
  );
}

/** The page of a link that does not work, with why and what to do. */
export function DeadLinkPage({ title, message }: { title: string; message: string }) {
  return (
    <Sheet>
      <PageTitle>{title}</PageTitle>
      <Notice kind="refused" live={false}>
        {message}
      </Notice>
      <p className="mt-4">
        <a href="/sign-in">Go to the sign-in page</a>
      </p>
    </Sheet>
  );
}
