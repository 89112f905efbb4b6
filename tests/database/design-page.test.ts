import { beforeAll, describe, expect, it } from 'vitest';
import { draftVersion, submittedVersion } from '@/lib/conduct/trial-facts';
import type { TrialReader } from '@/lib/queries/trial/reader-trial';
import { designEditPage, designPage } from '@/lib/queries/trial/design';
import { designAddressSchema } from '@/lib/schemas/design-address';
import { designDefaults } from '@/lib/schemas/design-defaults';
import type { Player, TrialPlay } from '@/scripts/demo/play-trial';
import { playCohort, playedDesign, playOpened, playTeam, type PlayedTeam } from '../factories/played-trial';
import { createTestDatabase } from '../setup/database';

beforeAll(async () => {
  await createTestDatabase();
});

const plainAddress = designAddressSchema.parse({});

async function readerOf(trial: TrialPlay, { personId }: Player): Promise<TrialReader> {
  const { state } = await trial.loaded();
  const member = state.members[personId];
  return {
    personId,
    printedName: 'Somebody',
    isAdministrator: false,
    memberships: member ? [{ trialId: state.trial.id, role: member.role, siteIds: member.siteIds }] : [],
    now: new Date(trial.now).toISOString(),
  };
}

const pageOf = async (trial: TrialPlay, player: Player, address: Record<string, unknown> = {}) =>
  designPage(await readerOf(trial, player), trial.code, designAddressSchema.parse(address));
const editPageOf = async (trial: TrialPlay, player: Player) =>
  designEditPage(await readerOf(trial, player), trial.code);

async function expectHiddenFromOthers(trial: TrialPlay, team: PlayedTeam): Promise<void> {
  for (const player of [...team.coordinators, team.sponsor, team.administrator]) {
    expect(await pageOf(trial, player)).toBeNull();
    expect(await editPageOf(trial, player)).toBeNull();
  }
  for (const player of team.reviewers) expect(await editPageOf(trial, player)).toBeNull();
}

describe('the design page', () => {
  it('offers the statistician the form and nobody else, before there is a design', async () => {
    const { trial, team } = await playTeam();
    expect(await pageOf(trial, team.statistician)).toMatchObject({
      shown: null,
      versions: [],
      edit: { why: null },
      comparison: null,
    });
    expect(await editPageOf(trial, team.statistician)).toMatchObject({ draft: null, why: null });
    expect(await pageOf(trial, team.reviewers[0])).toMatchObject({ shown: null, edit: null });
    await expectHiddenFromOthers(trial, team);
  });

  it('shows the draft with its acts to the statistician, then the submitted version with its acts to reviewers', async () => {
    const { trial, team } = await playTeam();
    await trial.run(team.statistician, 'save-design', { design: playedDesign });
    expect(await pageOf(trial, team.statistician)).toMatchObject({
      edit: { why: null },
      shown: { number: 1, state: 'draft', submit: { why: null }, approve: null, return: null },
    });
    expect(await pageOf(trial, team.reviewers[0])).toMatchObject({
      edit: null,
      shown: { submit: null, approve: null, return: null },
    });

    const versionId = draftVersion((await trial.loaded()).state)?.id ?? '';
    await trial.run(team.statistician, 'submit-design', { versionId });
    expect(await pageOf(trial, team.statistician)).toMatchObject({
      edit: null,
      shown: { state: 'submitted', submit: null, approve: null, return: null },
    });
    expect((await editPageOf(trial, team.statistician))?.why).toMatch(/in review or in force/);
    const submitted = submittedVersion((await trial.loaded()).state);
    expect(await pageOf(trial, team.reviewers[1])).toMatchObject({
      shown: {
        digest: submitted?.digest,
        approve: { why: null },
        return: { why: null },
        approvalMeaning: `I have reviewed design version 1 of ${trial.code} and approve it.`,
      },
    });

    const reason = 'The largest rise should be stated for the last level.';
    await trial.run(team.reviewers[1], 'return-design', { versionId, reason });
    expect(await pageOf(trial, team.statistician)).toMatchObject({
      shown: { state: 'draft', returnedReason: reason, submit: { why: null } },
    });
    expect(await editPageOf(trial, team.statistician)).toMatchObject({ returnedReason: reason, why: null });
    await expectHiddenFromOthers(trial, team);
  });

  it('says why a draft cannot be submitted yet', async () => {
    const { trial, team } = await playTeam();
    await trial.run(team.statistician, 'save-design', { design: designDefaults('range') });
    for (const { personId } of team.coordinators) {
      await trial.run(team.administrator, 'end-membership', { personId });
    }
    const view = await pageOf(trial, team.statistician);
    expect(view?.shown?.submit?.why).toMatch(/No active site has a coordinator/);
  });

  it('shows the version in force with its approval, whatever version the address asks for in vain', async () => {
    const { trial, team } = await playOpened();
    for (const version of [undefined, '1', '99', 'x', ['1', '2']]) {
      const view = await pageOf(trial, team.reviewers[2], { version });
      expect(view?.shown).toMatchObject({ number: 1, isInForce: true, approvals: [{}] });
    }
    expect((await pageOf(trial, team.statistician))?.comparison).toBeNull();
  });
});

/*
 * By hand, ln scale, Γ = 0.25, levels 10 20 40 60 90 120, at most twofold rises; doses 10, 20, 20 with 0, 1, 0 of 3 responses.
 * Robbins–Monro, c = 4.5: 10·e^1.125 = 30.8, at most 20 → 20; 20·e^(−2.25/12) = 16.6 → 20; 16.6·e^(1.5/4) = 24.1 → 20 (the
 * midpoint of 20 and 40 is 28.3). Virtual observations, b = 1/4.5: the first two alike (third: mean dose 14.14·e^(4.5/12) =
 * 20.6 → 20); then the geometric mean dose 15.87·e^(4.5·(0.25 − 1/9)) = 29.7 → 40.
 */
describe('the comparison of rules on the recorded history', () => {
  it('holds what each would have recommended beside what was released, for readers of recommendations', async () => {
    const { trial, team } = await playOpened();
    for (const [index, responses] of [0, 1, 0].entries()) {
      await playCohort(trial, team, responses);
      if (index < 2) await trial.release(team.reviewers.slice(0, 2));
    }
    const views = [
      await pageOf(trial, team.statistician),
      await pageOf(trial, team.reviewers[0], { compare: ['virtual-observations', 'robbins-monro'] }),
    ];
    const doses = (...values: string[]) => values.map((dose) => ({ dose, isStop: false }));
    for (const view of views) {
      expect(view?.comparison?.released).toEqual(['10', '20', '20', null]);
      expect(view?.comparison?.rules).toMatchObject([
        { name: 'robbins-monro', isOwn: true, failure: null, doses: doses('10', '20', '20', '20') },
        { name: 'virtual-observations', isOwn: false, failure: null, doses: doses('10', '20', '20', '40') },
      ]);
    }
    const all = await pageOf(trial, team.reviewers[0], {
      compare: ['joseph', 'logit-ml', 'no-such-rule', 'kesten', 'adaptive-slope'],
    });
    expect(all?.comparison?.rules.map(({ name }) => name)).toEqual([
      'kesten',
      'joseph',
      'adaptive-slope',
      'logit-ml',
    ]);
    for (const rule of all?.comparison?.rules ?? []) expect(rule.doses).toHaveLength(4);
    await expectHiddenFromOthers(trial, team);
  });
});

describe('what an address may say', () => {
  it('leaves out what cannot be read', () => {
    expect(plainAddress).toEqual({ version: undefined, compare: [] });
    expect(designAddressSchema.parse({ version: '-3', compare: 'kesten' })).toEqual({
      version: undefined,
      compare: ['kesten'],
    });
    expect(designAddressSchema.parse({ compare: Array(10_000).fill('x'), version: '1e9' })).toEqual({
      version: undefined,
      compare: [],
    });
  });
});
