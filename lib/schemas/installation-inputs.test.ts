import { describe, expect, it } from 'vitest';
import { installationInputSchemas as schemas } from './installation-inputs';

const ID = '019a1b2c-0000-7000-8000-000000000001';
const BIDI = 'Ines\u202eyrrauQ';
const ZERO_WIDTH = 'Ines\u200bQuarry';
const CONTROL = 'Ines\u0007Quarry';
const FIVE_MEGABYTES = 'a'.repeat(5_000_000);
const NOT_TEXT = [undefined, null, 7, true, {}, [], Symbol.iterator];

const person = { email: 'ines@example.org', printedName: 'Ines Quarry', isAdministrator: false };
const site = { code: 'ALD', name: 'Alder Clinic', timeZone: 'Europe/Vienna' };
const trial = { code: 'WELL-02', title: 'An invented trial', statisticianId: ID };
const accepted = { token: 'A'.repeat(43), password: 'gravel lantern orchid 47' };

type Schema = {
  safeParse: (input: unknown) => {
    success: boolean;
    error?: { issues: { path: PropertyKey[]; message: string }[] };
  };
};

/** Every field with texts that must be refused there, with a sentence at that very field. */
const refused: [string, Schema, object, string, unknown[]][] = [
  [
    'the address of a person',
    schemas['invite-person'],
    person,
    'email',
    [
      '',
      ' ',
      'ines',
      'ines@',
      '@example.org',
      'a@b',
      'a b@example.org',
      'a@example.org, b@example.org',
      'ines@example.org\r\nBcc: b@example.org',
      `${'a'.repeat(250)}@example.org`,
      'in\u202ees@example.org',
      'ines\u0000@example.org',
      FIVE_MEGABYTES,
      ...NOT_TEXT,
    ],
  ],
  [
    'the printed name',
    schemas['invite-person'],
    person,
    'printedName',
    [
      '',
      ' ',
      'I',
      BIDI,
      ZERO_WIDTH,
      CONTROL,
      'Ines\nQuarry',
      '\ud800Ines',
      'I'.repeat(121),
      FIVE_MEGABYTES,
      ...NOT_TEXT,
    ],
  ],
  [
    'the mark of an administrator',
    schemas['invite-person'],
    person,
    'isAdministrator',
    ['true', 1, null, undefined],
  ],
  [
    'the code of a site',
    schemas['create-site'],
    site,
    'code',
    ['', 'A', 'ald', 'A-1', 'ÄLD', 'A'.repeat(13), 'ALD\n1', 'A\u202eLD', FIVE_MEGABYTES, ...NOT_TEXT],
  ],
  [
    'the name of a site',
    schemas['create-site'],
    site,
    'name',
    ['', 'A', BIDI, CONTROL, 'A'.repeat(121), FIVE_MEGABYTES, ...NOT_TEXT],
  ],
  [
    'the time zone of a site',
    schemas['create-site'],
    site,
    'timeZone',
    [
      '',
      'Vienna',
      'Europe/Atlantis',
      '+01:00',
      'UTC+1',
      'Europe/Vienna\u0000',
      '../etc/localtime',
      'E'.repeat(65),
      FIVE_MEGABYTES,
      ...NOT_TEXT,
    ],
  ],
  [
    'the code of a trial',
    schemas['create-trial'],
    trial,
    'code',
    [
      '',
      'WE',
      'well-02',
      'WELL_02',
      'WELL--02',
      '-WELL',
      'WELL-',
      '2WELL',
      'W'.repeat(21),
      '../WELL',
      FIVE_MEGABYTES,
      ...NOT_TEXT,
    ],
  ],
  [
    'the title of a trial',
    schemas['create-trial'],
    trial,
    'title',
    ['', 'four', BIDI, CONTROL, 'A'.repeat(201), FIVE_MEGABYTES, ...NOT_TEXT],
  ],
  [
    'the first statistician',
    schemas['create-trial'],
    trial,
    'statisticianId',
    ['', 'ines', `${ID}0`, ID.toUpperCase(), FIVE_MEGABYTES, ...NOT_TEXT],
  ],
  [
    'the token of a link',
    schemas['accept-link'],
    accepted,
    'token',
    [
      '',
      'A'.repeat(42),
      'A'.repeat(44),
      `${'A'.repeat(42)}=`,
      `${'A'.repeat(42)}/`,
      FIVE_MEGABYTES,
      ...NOT_TEXT,
    ],
  ],
  [
    'a new password',
    schemas['accept-link'],
    accepted,
    'password',
    ['', 'short', 'aaaaaaaaaaaaaaaa', 'passwordpassword', 'x'.repeat(201), FIVE_MEGABYTES, ...NOT_TEXT],
  ],
  [
    'the person of an act',
    schemas['disable-person'],
    { personId: ID },
    'personId',
    ['', "' OR 1=1 --", ...NOT_TEXT],
  ],
  ['the mail to try again', schemas['retry-mail'], { mailId: ID }, 'mailId', ['', 'x', ...NOT_TEXT]],
];

describe('bad input is refused at its field, in a sentence', () => {
  it.each(refused)('%s', (_what, schema, good, field, values) => {
    expect(schema.safeParse(good).success).toBe(true);
    for (const value of values) {
      const result = schema.safeParse({ ...good, [field]: value });
      const issues = (result.error?.issues ?? []).filter(({ path }) => path.join('.') === field);
      expect([String(value).slice(0, 40), issues.length > 0]).toEqual([String(value).slice(0, 40), true]);
      for (const { message } of issues) expect(message).toMatch(/^[A-Z“].*[.]$/s);
    }
  });

  it('an object with a field too many, and what is no object, are refused', () => {
    for (const [, schema, good] of refused) {
      expect(schema.safeParse({ ...good, role: 'administrator' }).success).toBe(false);
      for (const wrong of [null, undefined, 'text', 7, []])
        expect(schema.safeParse(wrong).success).toBe(false);
    }
  });

  it('is refused quickly, however long the text', () => {
    const began = performance.now();
    schemas['invite-person'].safeParse({ ...person, email: FIVE_MEGABYTES, printedName: FIVE_MEGABYTES });
    schemas['create-site'].safeParse({
      code: FIVE_MEGABYTES,
      name: FIVE_MEGABYTES,
      timeZone: FIVE_MEGABYTES,
    });
    expect(performance.now() - began).toBeLessThan(500);
  });
});

describe('good input comes out tidy', () => {
  it('addresses in small letters, names trimmed and composed (NFC)', () => {
    const tidy = schemas['invite-person'].parse({
      email: '  Ines.Quarry@Example.ORG ',
      printedName: ' Zoe\u0308 Quarry ',
      isAdministrator: true,
    });
    expect(tidy).toEqual({
      email: 'ines.quarry@example.org',
      printedName: 'Zo\u00eb Quarry',
      isAdministrator: true,
    });
  });

  it.each(['UTC', 'Europe/Vienna', 'America/Argentina/Buenos_Aires', 'Asia/Kolkata', 'Etc/GMT+5'])(
    'the time zone %s keeps its name',
    (timeZone) => {
      expect(schemas['create-site'].parse({ ...site, timeZone }).timeZone).toBe(timeZone);
    },
  );

  it('every zone the page offers is taken', () => {
    for (const timeZone of ['UTC', ...Intl.supportedValuesOf('timeZone')]) {
      expect(schemas['create-site'].safeParse({ ...site, timeZone }).success).toBe(true);
    }
  });

  it('a zone typed in small letters gets its own spelling', () => {
    expect(schemas['create-site'].parse({ ...site, timeZone: 'europe/vienna' }).timeZone).toBe(
      'Europe/Vienna',
    );
  });
});
