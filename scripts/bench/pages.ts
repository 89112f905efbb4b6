import type { BenchRole, BenchTeam } from './team';

/** A page to be measured, as the role that uses it. */
export interface BenchPage {
  readonly name: string;
  /** Who looks; null where nobody is signed in. */
  readonly role: BenchRole | null;
  /** The folder below app/ that holds it. */
  readonly route: string;
  readonly hasCharts?: boolean;
  /** Its address, with the trial of so many cohorts that waits for its reviewers. */
  readonly address: (trial: { code: string; cohorts: number }, team: BenchTeam) => string;
}

const inTrial =
  (rest = ''): BenchPage['address'] =>
  ({ code }) =>
    `/trials/${code}${rest}`;
const at = (address: string) => () => address;

/** The main pages. */
export const PAGES: readonly BenchPage[] = [
  { name: 'sign in', role: null, route: '(public)/sign-in', address: at('/sign-in') },
  { name: 'today', role: 'coordinator', route: '(portal)/today', address: at('/today') },
  { name: 'today', role: 'reviewer', route: '(portal)/today', address: at('/today') },
  { name: 'account', role: 'coordinator', route: '(portal)/account', address: at('/account') },
  { name: 'trials', role: 'statistician', route: '(portal)/trials', address: at('/trials') },
  {
    name: 'overview',
    role: 'statistician',
    route: '(portal)/trials/[code]',
    hasCharts: true,
    address: inTrial(),
  },
  {
    name: 'cohorts',
    role: 'statistician',
    route: '(portal)/trials/[code]/cohorts',
    address: inTrial('/cohorts'),
  },
  {
    name: 'cohort, complete',
    role: 'coordinator',
    route: '(portal)/trials/[code]/cohorts/[number]',
    address: ({ code, cohorts }) => `/trials/${code}/cohorts/${cohorts}`,
  },
  {
    name: 'cohort, open (demo trial)',
    role: 'coordinator',
    route: '(portal)/trials/[code]/cohorts/[number]',
    address: (_, { demoTrial }) => `/trials/${demoTrial.code}/cohorts/${demoTrial.openCohort}`,
  },
  {
    name: 'review, packet waiting',
    role: 'reviewer',
    route: '(portal)/trials/[code]/review',
    address: inTrial('/review'),
  },
  {
    name: 'design',
    role: 'statistician',
    route: '(portal)/trials/[code]/design',
    address: inTrial('/design'),
  },
  {
    name: 'design, form (demo draft)',
    role: 'statistician',
    route: '(portal)/trials/[code]/design/edit',
    address: (_, { draftTrial }) => `/trials/${draftTrial.code}/design/edit`,
  },
  {
    name: 'summary',
    role: 'sponsor',
    route: '(portal)/trials/[code]/summary',
    hasCharts: true,
    address: inTrial('/summary'),
  },
  { name: 'team', role: 'statistician', route: '(portal)/trials/[code]/team', address: inTrial('/team') },
  { name: 'trail', role: 'statistician', route: '(portal)/trials/[code]/trail', address: inTrial('/trail') },
  ...(
    [
      ['administration', ''],
      ['people', '/people'],
      ['sites', '/sites'],
      ['trials and teams', '/trials'],
      ['mail', '/mail'],
      ['health', '/health'],
    ] as const
  ).map(([name, rest]): BenchPage => ({
    name,
    role: 'administrator',
    route: `(portal)/administration${rest}`,
    address: at(`/administration${rest}`),
  })),
  {
    name: 'a person',
    role: 'administrator',
    route: '(portal)/administration/people/[personId]',
    address: (_, { players }) => `/administration/people/${players.coordinator.personId}`,
  },
  {
    name: 'a trial’s team',
    role: 'administrator',
    route: '(portal)/administration/trials/[code]',
    address: ({ code }) => `/administration/trials/${code}`,
  },
];
