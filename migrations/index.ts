import type { Migration } from './migration';
import { createPeople } from './0001-create-people';
import { createSessions } from './0002-create-sessions';
import { createOneTimeLinks } from './0003-create-one-time-links';
import { createSignInAttempts } from './0004-create-sign-in-attempts';
import { createInstallation } from './0005-create-installation';
import { createDemoAccounts } from './0006-create-demo-accounts';
import { createSites } from './0007-create-sites';
import { createTrials } from './0008-create-trials';
import { createTrialSites } from './0009-create-trial-sites';
import { createMemberships } from './0010-create-memberships';
import { createMembershipSites } from './0011-create-membership-sites';
import { createDesignVersions } from './0012-create-design-versions';
import { createRecommendations } from './0013-create-recommendations';
import { createReleases } from './0014-create-releases';
import { createCohorts } from './0015-create-cohorts';
import { createSubjects } from './0016-create-subjects';
import { createHalts } from './0017-create-halts';
import { createSignatures } from './0018-create-signatures';
import { createEvents } from './0019-create-events';
import { createEventPayloads } from './0020-create-event-payloads';
import { refuseUpdateOfEvents } from './0021-refuse-update-of-events';
import { refuseDeleteOfEvents } from './0022-refuse-delete-of-events';
import { refuseUpdateOfEventPayloads } from './0023-refuse-update-of-event-payloads';
import { refuseDeleteOfEventPayloads } from './0024-refuse-delete-of-event-payloads';
import { createSubmissions } from './0025-create-submissions';
import { createOutbox } from './0026-create-outbox';
import { createCaughtMails } from './0027-create-caught-mails';

/** Every migration, in the order they run. A new one is added at the end. */
export const migrations: readonly Migration[] = [
  createPeople,
  createSessions,
  createOneTimeLinks,
  createSignInAttempts,
  createInstallation,
  createDemoAccounts,
  createSites,
  createTrials,
  createTrialSites,
  createMemberships,
  createMembershipSites,
  createDesignVersions,
  createRecommendations,
  createReleases,
  createCohorts,
  createSubjects,
  createHalts,
  createSignatures,
  createEvents,
  createEventPayloads,
  refuseUpdateOfEvents,
  refuseDeleteOfEvents,
  refuseUpdateOfEventPayloads,
  refuseDeleteOfEventPayloads,
  createSubmissions,
  createOutbox,
  createCaughtMails,
];
