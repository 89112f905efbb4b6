import { cache } from 'react';
import { type Offers, offersFor } from '@/lib/conduct/offers';
import type { Instant } from '@/lib/conduct/state';
import { type Actor, membershipIn, type TrialRole } from '@/lib/policy/roles';
import { roleMay, type TrialPermission } from '@/lib/policy/trial-permissions';
import { findTrial, type LoadedTrial } from '../load-trial-state';

/** A person who reads, and the time they read at. */
export type TrialReader = Actor & { readonly now: Instant };

/**
 * A trial as loaded for one reader. It is whole: it never leaves `lib/queries`. Each page's query makes from it a plain
 * view that holds only what the reader's role may see.
 */
export interface ReaderTrial {
  readonly loaded: LoadedTrial;
  readonly role: TrialRole;
  readonly siteIds: readonly string[];
  readonly offers: Offers;
  readonly now: Instant;
  readonly may: (permission: TrialPermission) => boolean;
}

const trialByCode = cache((code: string) => findTrial({ code }));

/**
 * The trial of an address for a reader with a standing role in it; null when there is none or the reader has no access,
 * which look alike. Loaded once a request.
 */
export async function readerTrial(reader: TrialReader, code: string): Promise<ReaderTrial | null> {
  if (reader.memberships.length === 0) return null;
  const loaded = await trialByCode(code);
  if (loaded === null) return null;
  const membership = membershipIn(reader, loaded.state.trial.id);
  if (membership === null) return null;
  const { role, siteIds } = membership;
  return {
    loaded,
    role,
    siteIds,
    now: reader.now,
    offers: offersFor(loaded.state, { personId: reader.personId, role, siteIds }, reader.now),
    may: (permission) => roleMay(role, permission),
  };
}

/** True when the trial of an address is the reader's and their role carries the permission. */
export async function mayInTrialByCode(
  reader: TrialReader,
  code: string,
  permission: TrialPermission,
): Promise<boolean> {
  const trial = await readerTrial(reader, code);
  return trial !== null && trial.may(permission);
}
