'use server';

import { signOutHere } from '@/lib/server/sign-out';

/** Signs out: the session of this browser ends. Takes nothing, and is anybody's own to do. */
export async function signOut(): Promise<void> {
  await signOutHere();
}
