import { describe, expect, it } from 'vitest';
import { type SignedCommandType, trialFormSchemas } from './trial-forms';
import { SIGNED_COMMANDS, type TrialCommandType, trialInputSchemas } from './trial-inputs';

const ID = '0190f3b0-0000-7000-8000-000000000001';
const signed: Record<SignedCommandType, true> = {
  'approve-design': true,
  'sign-recommendation': true,
  'sign-lift': true,
};

describe('the forms of a trial', () => {
  it('are one for each command', () => {
    expect(Object.keys(trialFormSchemas)).toEqual(Object.keys(trialInputSchemas));
  });

  it('name as signatures in their types what is signed in the conduct', () => {
    expect(Object.keys(signed).sort()).toEqual([...SIGNED_COMMANDS].sort());
  });

  it.each(Object.keys(trialInputSchemas) as TrialCommandType[])(
    '%s asks for the trial’s code, for credentials where it is a signature, and takes nothing unknown',
    (type) => {
      const shape = Object.keys(trialFormSchemas[type].shape);
      expect(shape).toContain('trialCode');
      expect(shape.includes('password')).toBe(SIGNED_COMMANDS.includes(type));
      expect(shape.includes('email')).toBe(SIGNED_COMMANDS.includes(type));
      for (const field of Object.keys(trialInputSchemas[type].shape)) expect(shape).toContain(field);
      const unknown = trialFormSchemas[type].safeParse({ isAdministrator: true });
      expect(unknown.error?.issues.some((issue) => issue.code === 'unrecognized_keys')).toBe(true);
    },
  );

  it('keep the refinements of their commands, with the field named', () => {
    const release = {
      trialCode: 'WELL-02',
      email: 'a@b.example',
      password: 'x',
      recommendationId: ID,
      seenDigest: 'a'.repeat(64),
      decision: 'release',
    };
    const refused = trialFormSchemas['sign-recommendation'].safeParse(release);
    expect(refused.error?.issues.map(({ path, message }) => [path.join('.'), message])).toEqual([
      ['dose', 'Choose the dose to release.'],
    ]);
    expect(trialFormSchemas['sign-recommendation'].parse({ ...release, dose: '60' })).toMatchObject({
      dose: '60',
      trialCode: 'WELL-02',
    });
    const noOnset = { trialCode: 'WELL-02', subjectId: ID, outcome: 'present' };
    const issue = trialFormSchemas['record-outcome'].safeParse(noOnset).error?.issues[0];
    expect(issue?.path).toEqual(['onsetAt']);
  });

  it.each(['well-02', 'WELL-02 ', 'WELL--02', "WELL-02' OR 1=1", '../WELL-02', '', 'W'.repeat(21)])(
    'refuse %j as a trial’s code',
    (trialCode) => {
      const input = { trialCode, reason: 'A reason long enough' };
      const issue = trialFormSchemas['halt-trial'].safeParse(input).error?.issues[0];
      expect(issue?.path).toEqual(['trialCode']);
    },
  );
});
