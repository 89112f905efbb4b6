import type { Sequelize } from 'sequelize';
import { Person, initPerson } from './person';
import { Session, initSession } from './session';
import { OneTimeLink, initOneTimeLink } from './one-time-link';
import { SignInAttempt, initSignInAttempt } from './sign-in-attempt';
import { Installation, initInstallation } from './installation';
import { DemoAccount, initDemoAccount } from './demo-account';
import { Site, initSite } from './site';
import { Trial, initTrial } from './trial';
import { TrialSite, initTrialSite } from './trial-site';
import { Membership, initMembership } from './membership';
import { MembershipSite, initMembershipSite } from './membership-site';
import { DesignVersion, initDesignVersion } from './design-version';
import { Recommendation, initRecommendation } from './recommendation';
import { Release, initRelease } from './release';
import { Cohort, initCohort } from './cohort';
import { Subject, initSubject } from './subject';
import { Halt, initHalt } from './halt';
import { Signature, initSignature } from './signature';
import { Event, initEvent } from './event';
import { EventPayload, initEventPayload } from './event-payload';
import { Submission, initSubmission } from './submission';
import { OutboxMail, initOutboxMail } from './outbox-mail';
import { CaughtMail, initCaughtMail } from './caught-mail';

const models = {
  Person,
  Session,
  OneTimeLink,
  SignInAttempt,
  Installation,
  DemoAccount,
  Site,
  Trial,
  TrialSite,
  Membership,
  MembershipSite,
  DesignVersion,
  Recommendation,
  Release,
  Cohort,
  Subject,
  Halt,
  Signature,
  Event,
  EventPayload,
  Submission,
  OutboxMail,
  CaughtMail,
};
export type Models = typeof models;

/** Binds every model to a connection. The classes are bound once per process (lib/db/connection.ts keeps them). */
export function initModels(sequelize: Sequelize): Models {
  initPerson(sequelize);
  initSession(sequelize);
  initOneTimeLink(sequelize);
  initSignInAttempt(sequelize);
  initInstallation(sequelize);
  initDemoAccount(sequelize);
  initSite(sequelize);
  initTrial(sequelize);
  initTrialSite(sequelize);
  initMembership(sequelize);
  initMembershipSite(sequelize);
  initDesignVersion(sequelize);
  initRecommendation(sequelize);
  initRelease(sequelize);
  initCohort(sequelize);
  initSubject(sequelize);
  initHalt(sequelize);
  initSignature(sequelize);
  initEvent(sequelize);
  initEventPayload(sequelize);
  initSubmission(sequelize);
  initOutboxMail(sequelize);
  initCaughtMail(sequelize);
  return models;
}

export {
  Person,
  Session,
  OneTimeLink,
  SignInAttempt,
  Installation,
  DemoAccount,
  Site,
  Trial,
  TrialSite,
  Membership,
  MembershipSite,
  DesignVersion,
  Recommendation,
  Release,
  Cohort,
  Subject,
  Halt,
  Signature,
  Event,
  EventPayload,
  Submission,
  OutboxMail,
  CaughtMail,
};
