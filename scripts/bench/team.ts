import { currentCohort } from '@/lib/conduct/trial-facts';
import { models } from '@/lib/db/connection';
import { findTrial, type LoadedTrial } from '@/lib/queries/load-trial-state';
import type { TrialRole } from '@/lib/policy/roles';
import type { Player } from '../demo/play-trial';

export type BenchRole = 'administrator' | 'coordinator' | 'reviewer' | 'statistician' | 'sponsor';

/** Who plays in the bench's trials, and the demo's trials beside them. */
export interface BenchTeam {
  /** Who looks at pages. */
  readonly players: Readonly<Record<BenchRole, Player>>;
  readonly reviewers: readonly Player[];
  /** Coordinators with their site. */
  readonly coordinators: readonly {
    readonly player: Player;
    readonly siteId: string;
    readonly siteCode: string;
  }[];
  readonly demoTrial: { readonly code: string; readonly openCohort: number };
  readonly draftTrial: { readonly code: string };
}

async function demoPlayers(): Promise<Map<string, Player>> {
  const accounts = await models().DemoAccount.findAll();
  const people = await models().Person.findAll({ where: { id: accounts.map(({ personId }) => personId) } });
  const passwords = new Map(accounts.map(({ personId, password }) => [personId, password]));
  return new Map(
    people.map(({ id, email }) => [id, { personId: id, email, password: passwords.get(id) ?? '' }]),
  );
}

function holdersOf(loaded: LoadedTrial, role: TrialRole, players: Map<string, Player>): Player[] {
  return Object.values(loaded.state.members)
    .filter((member) => member.role === role && member.endedAt === null)
    .flatMap(({ personId }) => players.get(personId) ?? [])
    .sort((a, b) => a.email.localeCompare(b.email));
}

function firstOf<T>(found: readonly T[], what: string): T {
  const [first] = found;
  if (first === undefined) throw new Error(`The demo data holds no ${what}.`);
  return first;
}

/** Reads from the demo data who holds which role in its open trial; they hold the same in the bench's trials. */
export async function benchTeam(): Promise<BenchTeam> {
  const players = await demoPlayers();
  const trials = await models().Trial.findAll({ attributes: ['code', 'state'] });
  const codeOf = (state: string) =>
    firstOf(
      trials.filter((trial) => trial.state === state),
      `trial that is ${state}`,
    ).code;
  const loaded = await findTrial({ code: codeOf('open') });
  const cohort = loaded && currentCohort(loaded.state);
  if (!loaded || !cohort) throw new Error('The open trial of the demo data has no open cohort.');
  const reviewers = holdersOf(loaded, 'reviewer', players);
  const coordinators = holdersOf(loaded, 'coordinator', players).map((player) => {
    const siteId = firstOf(loaded.state.members[player.personId]?.siteIds ?? [], 'site of a coordinator');
    return { player, siteId, siteCode: loaded.sites[siteId]?.code ?? '' };
  });
  const administrator = await models().Person.findOne({
    where: { isAdministrator: true },
    rejectOnEmpty: true,
  });
  return {
    players: {
      administrator: firstOf(
        [players.get(administrator.id)].filter((each) => each !== undefined),
        'administrator',
      ),
      coordinator: firstOf(coordinators, 'coordinator').player,
      reviewer: firstOf(reviewers, 'reviewer'),
      statistician: firstOf(holdersOf(loaded, 'statistician', players), 'statistician'),
      sponsor: firstOf(holdersOf(loaded, 'sponsor', players), 'sponsor'),
    },
    reviewers,
    coordinators,
    demoTrial: { code: loaded.state.trial.code, openCohort: cohort.number },
    draftTrial: { code: codeOf('draft') },
  };
}
