import { describe, expect, it } from 'vitest';
import { RefusedError } from '@/lib/errors';
import type { InstallationContext } from './decision';
import { INSTALLATION_EVENT_SCHEMA_VERSION, installationEventSchema } from './events';
import {
  acceptLink,
  LINK_LIFE_MILLISECONDS,
  newLink,
  type OneTimeLinkFacts,
  type PersonFacts,
  requestedReset,
  RESET_PAUSE_MILLISECONDS,
  whyLinkFails,
} from './links';
import { retryMail } from './mail';
import {
  disablePerson,
  enablePerson,
  invitePerson,
  resendInvitation,
  resetByAdministrator,
  whyNoTrialRole,
} from './people';
import { createSite, registerTrial } from './places';

const NOW = '2027-03-01T09:00:00.000Z';
const DIGEST = 'a'.repeat(64);
const context: InstallationContext = {
  now: NOW,
  actor: { personId: 'admin', role: 'administrator' },
  newId: () => 'new-id',
};
const stranger: InstallationContext = { ...context, actor: { personId: 'someone', role: 'link-holder' } };
const visitor: InstallationContext = { ...context, actor: { personId: null, role: 'visitor' } };

const person = (changes: Partial<PersonFacts> = {}): PersonFacts => ({
  personId: 'person',
  state: 'active',
  isAdministrator: false,
  hasPassword: true,
  ...changes,
});
const link = (changes: Partial<OneTimeLinkFacts> = {}): OneTimeLinkFacts => ({
  digest: DIGEST,
  purpose: 'invitation',
  personId: 'person',
  expiresAt: '2027-03-02T09:00:00.000Z',
  usedAt: null,
  ...changes,
});

function refusalOf(decide: () => unknown) {
  try {
    decide();
  } catch (error) {
    if (error instanceof RefusedError) return error.refusal;
    throw error;
  }
  throw new Error('It was not refused.');
}

const INVITED = person({ state: 'invited', hasPassword: false });
const DISABLED = person({ state: 'disabled' });
const MADE = { personId: 'new', linkDigest: DIGEST };

/** Every act of an administrator, on facts that let it pass. */
const acts: [string, (by: InstallationContext) => readonly { kind: string }[], string[]][] = [
  [
    'invite a person',
    (by) => invitePerson({ addressInUse: false }, { isAdministrator: false }, MADE, by),
    ['person-invited', 'link-created'],
  ],
  [
    'send an invitation again',
    (by) => resendInvitation(INVITED, DIGEST, by),
    ['links-ended', 'link-created'],
  ],
  [
    'mail a link for a new password',
    (by) => resetByAdministrator(person(), DIGEST, by),
    ['password-reset-requested', 'links-ended', 'link-created'],
  ],
  ['disable an account', (by) => disablePerson(person(), 1, by), ['person-disabled', 'links-ended']],
  ['enable an account', (by) => enablePerson(DISABLED, by), ['person-enabled']],
  [
    'create a site',
    (by) => createSite({ codeInUse: false }, { code: 'ALD', timeZone: 'Europe/Vienna' }, 'site', by),
    ['site-created'],
  ],
  [
    'register a trial',
    (by) => registerTrial({ codeInUse: false, statistician: person() }, { code: 'WELL-02' }, 'trial', by),
    ['trial-registered'],
  ],
  [
    'queue a mail again',
    (by) => retryMail({ id: 'mail', kind: 'trial-halted', state: 'dead' }, by),
    ['mail-queued-again'],
  ],
];

describe('acts of an administrator', () => {
  it.each(acts)('%s: the events, each fit for the trail', (_name, decide, kinds) => {
    const events = decide(context);
    expect(events.map(({ kind }) => kind)).toEqual(kinds);
    for (const event of events) expect(installationEventSchema.parse(event)).toEqual(event);
  });

  it.each(acts)('%s: for others it does not exist', (_name, decide) => {
    expect(refusalOf(() => decide(stranger)).code).toBe('not-found');
    expect(refusalOf(() => decide(visitor)).code).toBe('not-found');
  });
});

describe('refusals name the field concerned', () => {
  it('an address, a site code and a trial code that are in use', () => {
    expect(
      refusalOf(() => invitePerson({ addressInUse: true }, { isAdministrator: false }, MADE, context)).fields,
    ).toHaveProperty('email');
    expect(
      refusalOf(() => createSite({ codeInUse: true }, { code: 'ALD', timeZone: 'UTC' }, 'id', context))
        .fields,
    ).toHaveProperty('code');
    expect(
      refusalOf(() =>
        registerTrial({ codeInUse: true, statistician: person() }, { code: 'WELL-02' }, 'id', context),
      ).fields,
    ).toHaveProperty('code');
  });

  it.each([
    ['nobody', null],
    ['the administrator who asks', person({ personId: 'admin', isAdministrator: true })],
    ['another administrator', person({ isAdministrator: true })],
    ['a disabled account', DISABLED],
  ])('a first statistician who is %s', (_who, statistician) => {
    const decide = () =>
      registerTrial({ codeInUse: false, statistician }, { code: 'WELL-02' }, 'id', context);
    expect(refusalOf(decide).fields).toHaveProperty('statisticianId');
  });
});

describe('accounts', () => {
  it('nobody disables themselves, nor the last administrator', () => {
    const oneself = person({ personId: 'admin', isAdministrator: true });
    expect(refusalOf(() => disablePerson(oneself, 3, context)).message).toContain('your own account');
    const other = person({ isAdministrator: true });
    expect(refusalOf(() => disablePerson(other, 0, context)).message).toContain('last administrator');
    expect(disablePerson(other, 1, context)).toHaveLength(2);
  });

  it('an account is disabled once and enabled once', () => {
    expect(refusalOf(() => disablePerson(DISABLED, 1, context)).message).toContain('already');
    expect(refusalOf(() => enablePerson(person(), context)).message).toContain('not disabled');
  });

  it('an enabled account is what it was: active with its password, else waiting for an invitation', () => {
    expect(enablePerson(DISABLED, context)).toMatchObject([{ state: 'active' }]);
    expect(enablePerson({ ...DISABLED, hasPassword: false }, context)).toMatchObject([{ state: 'invited' }]);
  });

  it('an invitation goes to the invited, a new password to the active', () => {
    for (const wrong of [person(), DISABLED]) {
      expect(refusalOf(() => resendInvitation(wrong, DIGEST, context)).code).toBe('refused');
    }
    for (const wrong of [INVITED, DISABLED]) {
      expect(refusalOf(() => resetByAdministrator(wrong, DIGEST, context)).code).toBe('refused');
    }
  });

  it('administrators and disabled accounts hold no role in a trial; invited people may', () => {
    expect(whyNoTrialRole(person({ isAdministrator: true }))).toContain('no clinical data');
    expect(whyNoTrialRole(DISABLED)).toContain('disabled');
    expect(whyNoTrialRole(INVITED)).toBeNull();
    expect(whyNoTrialRole(person())).toBeNull();
  });
});

describe('links', () => {
  it('an invitation works for seven days, the others for one', () => {
    const days = Object.entries(LINK_LIFE_MILLISECONDS).map(([purpose, life]) => [
      purpose,
      life / 86_400_000,
    ]);
    expect(Object.fromEntries(days)).toEqual({
      invitation: 7,
      'password-reset': 1,
      'first-administrator': 1,
    });
    const made = newLink({ digest: DIGEST, purpose: 'invitation', personId: 'person' }, false, context);
    expect(made).toMatchObject([{ kind: 'link-created', expiresAt: '2027-03-08T09:00:00.000Z' }]);
  });

  it.each([
    ['works until its last millisecond', link({ expiresAt: '2027-03-01T09:00:00.001Z' }), INVITED, null],
    ['does not work at the instant it expires', link({ expiresAt: NOW }), INVITED, /expired/],
    ['works once', link({ usedAt: '2027-02-28T00:00:00.000Z' }), person(), /used already/],
    ['works for nobody who was disabled', link(), DISABLED, /disabled/],
    ['is not known', null, null, /not known/],
  ])('a link %s', (_what, row, owner, sentence) => {
    const failure = whyLinkFails(row, owner, NOW);
    if (sentence === null) expect(failure).toBeNull();
    else expect(failure?.message).toMatch(sentence);
  });

  it.each([
    ['first-administrator', 'Restart'],
    ['invitation', 'Ask an administrator'],
    ['password-reset', 'Forgotten password'],
  ] as const)('says how to get a new one: %s', (purpose, advice) => {
    expect(whyLinkFails(link({ purpose, expiresAt: NOW }), INVITED, NOW)?.message).toContain(advice);
  });

  const facts = { link: link(), person: INVITED, administratorExists: true, addressInUse: false };

  it('activates the invited as what they were invited', () => {
    for (const isAdministrator of [false, true]) {
      const invited = { ...INVITED, isAdministrator };
      expect(acceptLink({ ...facts, person: invited }, 'unused', context)).toEqual([
        { kind: 'person-activated', personId: 'person', linkDigest: DIGEST, isAdministrator },
      ]);
    }
  });

  it('sets a new password of the active', () => {
    const reset = { ...facts, link: link({ purpose: 'password-reset' }), person: person() };
    expect(acceptLink(reset, 'unused', context)).toEqual([
      { kind: 'password-set', personId: 'person', linkDigest: DIGEST },
    ]);
  });

  it('makes the first administrator, and no second', () => {
    const first = {
      ...facts,
      link: link({ purpose: 'first-administrator', personId: null }),
      person: null,
      administratorExists: false,
    };
    expect(acceptLink(first, 'new', context)).toEqual([
      { kind: 'person-activated', personId: 'new', linkDigest: DIGEST, isAdministrator: true },
    ]);
    const second = { ...first, administratorExists: true };
    expect(refusalOf(() => acceptLink(second, 'new', context)).message).toContain('an administrator already');
    const taken = { ...first, addressInUse: true };
    expect(refusalOf(() => acceptLink(taken, 'new', context)).fields).toHaveProperty('email');
  });

  it('a reset asked for by a visitor: by state of the account, and not twice within the pause', () => {
    const ago = (milliseconds: number) => new Date(Date.parse(NOW) - milliseconds).toISOString();
    expect(requestedReset(null, null, NOW)).toBeNull();
    expect(requestedReset(DISABLED, null, NOW)).toBeNull();
    expect(requestedReset(person(), null, NOW)).toBe('password-reset');
    expect(requestedReset(INVITED, null, NOW)).toBe('invitation');
    expect(requestedReset(person(), ago(RESET_PAUSE_MILLISECONDS - 1), NOW)).toBeNull();
    expect(requestedReset(person(), ago(RESET_PAUSE_MILLISECONDS), NOW)).toBe('password-reset');
  });
});

describe('mail', () => {
  it('is queued again only when it was given up, and never with a wiped link', () => {
    for (const state of ['queued', 'sent', 'overtaken']) {
      const mail = { id: 'mail', kind: 'trial-halted', state };
      expect(refusalOf(() => retryMail(mail, context)).code).toBe('refused');
    }
    for (const kind of ['invitation', 'password-reset']) {
      const mail = { id: 'mail', kind, state: 'dead' };
      expect(refusalOf(() => retryMail(mail, context)).message).toContain('wiped');
    }
  });
});

describe('events', () => {
  it('take no field that is not theirs: no name, address or token slips into the trail', () => {
    const event = { kind: 'person-invited', personId: 'person', isAdministrator: false };
    expect(INSTALLATION_EVENT_SCHEMA_VERSION).toBe(1);
    expect(installationEventSchema.safeParse(event).success).toBe(true);
    for (const extra of [{ email: 'a@example.org' }, { printedName: 'A' }, { token: 'x' }]) {
      expect(installationEventSchema.safeParse({ ...event, ...extra }).success).toBe(false);
    }
  });
});
