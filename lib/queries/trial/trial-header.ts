import { doseNumber, doseText } from '@/lib/design/dose-text';
import { standingHalt, submittedVersion, draftVersion, versionInForce } from '@/lib/conduct/trial-facts';
import type { TrialLife } from '@/lib/conduct/state';
import { ROLE_NAMES } from '@/lib/policy/roles';
import type { Design } from '@/lib/schemas/design';
import { courseOfDoses, type CourseView } from './course-of-doses';
import { readerTrial, type TrialReader } from './reader-trial';

/** What the header of every page of a trial shows. */
export interface TrialHeaderView {
  readonly code: string;
  readonly title: string;
  readonly state: TrialLife;
  readonly summary: string;
  readonly roleName: string;
  /** Present while the reader may halt. */
  readonly mayHalt: boolean;
  readonly halt: { readonly reason: string; readonly haltedAt: string } | null;
  readonly course: CourseView | null;
  readonly tabs: readonly { readonly href: string; readonly label: string }[];
}

/** The header of a trial for a reader, or null when it is not theirs. */
export async function trialHeader(reader: TrialReader, code: string): Promise<TrialHeaderView | null> {
  const trial = await readerTrial(reader, code);
  if (trial === null) return null;
  const { state } = trial.loaded;
  const version = versionInForce(state) ?? submittedVersion(state) ?? draftVersion(state);
  const mayReadDesign = trial.may('design.read') || versionInForce(state) !== null;
  const halt = standingHalt(state);
  const base = `/trials/${state.trial.code}`;
  const tabs = [
    { href: base, label: 'Overview', isShown: trial.role !== 'sponsor' },
    { href: `${base}/cohorts`, label: 'Cohorts', isShown: trial.may('cohort.read') },
    { href: `${base}/review`, label: 'Review', isShown: trial.may('recommendation.read') },
    { href: `${base}/design`, label: 'Design', isShown: trial.may('design.read') },
    { href: `${base}/summary`, label: 'Summary', isShown: trial.may('summary.read') },
    { href: `${base}/team`, label: 'Team', isShown: trial.may('team.read') },
    { href: `${base}/trail`, label: 'Trail', isShown: trial.may('trail.read') },
  ].filter((tab) => tab.isShown);
  return {
    code: state.trial.code,
    title: state.trial.title,
    state: state.trial.state,
    summary: version && mayReadDesign ? summaryOf(version) : 'The design is being written.',
    roleName: ROLE_NAMES[trial.role],
    mayHalt: trial.offers.halt?.why === null,
    halt: halt && { reason: halt.reason, haltedAt: halt.haltedAt },
    course: courseOfDoses(trial),
    tabs: tabs.map(({ href, label }) => ({ href, label })),
  };
}

function summaryOf({ design, number }: { design: Design; number: number }): string {
  const doses =
    design.doses.kind === 'levels'
      ? `levels ${doseNumber(design.doseNotation, design.doses.levels[0] ?? '')} to ${doseText(design, design.doses.levels.at(-1) ?? '')}`
      : `${doseNumber(design.doseNotation, design.doses.lowest)} to ${doseText(design, design.doses.highest)} by ${doseNumber(design.doseNotation, design.doses.increment)}`;
  return `Target ${design.target} ${design.response.present} · cohorts of ${design.cohortSize} · ${doses} · design version ${number}`;
}
