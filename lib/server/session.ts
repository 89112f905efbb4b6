import 'server-only';
import { notFound, redirect } from 'next/navigation';
import { after } from 'next/server';
import { headers } from 'next/headers';
import { cache } from 'react';
import { isSeenDue } from '@/lib/policy/session-times';
import { tokenDigest } from '@/lib/auth/tokens';
import { touchSession } from '@/lib/commands/end-session';
import { mayInInstallation, type InstallationPermission } from '@/lib/policy/installation-permissions';
import { sessionReader, type Reader, type ReaderMembership } from '@/lib/queries/session-reader';
import { sessionToken } from './session-cookie';

export type { Reader, ReaderMembership };

/** The reader of this request, or null; the idle time goes on. For routes that are polled. Asked once a request. */
export const peekReader = cache(async (): Promise<Reader | null> => {
  const token = await sessionToken();
  return token === null ? null : sessionReader(tokenDigest(token), Date.now());
});

/** Notes, after the answer and at most once a minute, that the session is in use. */
const noteUse = cache((reader: Reader): void => {
  if (isSeenDue(new Date(reader.sessionLastSeenAt), Date.now())) {
    after(() => touchSession(reader.sessionId));
  }
});

/**
 * Who asks, or null when nobody is signed in. One statement a request; the idle time begins anew. In server components
 * it may be called wherever it is needed.
 */
export async function currentReader(): Promise<Reader | null> {
  const reader = await peekReader();
  if (reader !== null) noteUse(reader);
  return reader;
}

/** The reader of a page; sends a visitor who is not signed in to the sign-in page, and from there back. */
export async function requireReader(): Promise<Reader> {
  const reader = await currentReader();
  if (reader !== null) return reader;
  const address = (await headers()).get('x-stepwell-address');
  redirect(
    address === null
      ? '/sign-in?because=ended'
      : `/sign-in?because=ended&next=${encodeURIComponent(address)}`,
  );
}

/** The reader's standing membership in the trial of this code, or null. */
export function membershipByCode(reader: Reader, trialCode: string): ReaderMembership | null {
  return reader.memberships.find((membership) => membership.trialCode === trialCode) ?? null;
}

/** The reader of a page of the administration; for everybody else it does not exist. */
export async function requireInstallationReader(permission: InstallationPermission): Promise<Reader> {
  const reader = await requireReader();
  if (!mayInInstallation(reader, permission)) notFound();
  return reader;
}
