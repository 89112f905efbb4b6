import { QueryTypes } from 'sequelize';
import { sequelize } from '@/lib/db/connection';
import { ROLE_NAMES, type TrialRole } from '@/lib/policy/roles';
import { roleMay } from '@/lib/policy/trial-permissions';
import type { TrialReader } from './trial/reader-trial';

/** One thing that waits for the reader, with the page where it is done. */
export interface Waiting {
  readonly trialCode: string;
  readonly trialTitle: string;
  readonly what: string;
  readonly href: string;
  /** When it is due or since when it waits; null where it has no time. */
  readonly at: string | null;
  readonly isOverdue: boolean;
}

/** A trial of the reader, as a line of Today and of the trials' table. */
export interface TrialLine {
  readonly code: string;
  readonly title: string;
  readonly state: string;
  readonly roleName: string;
  readonly cohortNumber: number | null;
  readonly cohortState: string | null;
}

export interface TodayView {
  readonly waiting: readonly Waiting[];
  readonly trials: readonly TrialLine[];
}

interface TrialFactsRow {
  id: string;
  code: string;
  title: string;
  state: string;
  cohortId: string | null;
  cohortNumber: number | null;
  cohortState: string | null;
  cohortSize: number | null;
  isRecordsOnly: number | null;
  isClosedShort: number | null;
  placesTaken: number;
  draftId: string | null;
  returnedReason: string | null;
  submittedAt: Date | null;
  recommendationNumber: number | null;
  recommendationAt: Date | null;
  hasSigned: number;
  haltedAt: Date | null;
  hasSignedLift: number;
}

interface SubjectRow {
  trialId: string;
  cohortNumber: number;
  code: string;
  state: 'reserved' | 'dosed';
  reservedAt: Date;
  windowEndsAt: Date | null;
}

/** The trials of a reader with what is going on in each: one statement, whatever their number. */
async function trialRows(reader: TrialReader): Promise<TrialFactsRow[]> {
  return sequelize().query(
    `SELECT t.id, t.code, t.title, t.state,
       c.id AS cohortId, c.number AS cohortNumber, c.state AS cohortState, c.size AS cohortSize,
       c.is_records_only AS isRecordsOnly, c.is_closed_short AS isClosedShort,
       (SELECT COUNT(*) FROM subjects s WHERE s.cohort_id = c.id AND s.place IS NOT NULL) AS placesTaken,
       d.id AS draftId, d.returned_reason AS returnedReason, u.submitted_at AS submittedAt,
       r.number AS recommendationNumber, r.computed_at AS recommendationAt,
       EXISTS (SELECT 1 FROM signatures g
         WHERE g.recommendation_id = r.id AND g.person_id = :personId AND g.is_standing) AS hasSigned,
       h.halted_at AS haltedAt,
       EXISTS (SELECT 1 FROM signatures g
         WHERE g.halt_id = h.id AND g.person_id = :personId AND g.is_standing) AS hasSignedLift
     FROM trials t
     LEFT JOIN cohorts c ON c.open_trial_id = t.id
     LEFT JOIN design_versions d ON d.trial_id = t.id AND d.state = 'draft'
     LEFT JOIN design_versions u ON u.trial_id = t.id AND u.state = 'submitted'
     LEFT JOIN recommendations r ON r.awaiting_trial_id = t.id
     LEFT JOIN halts h ON h.standing_trial_id = t.id
     WHERE t.id IN (:trialIds)
     ORDER BY t.code`,
    {
      type: QueryTypes.SELECT,
      replacements: {
        personId: reader.personId,
        trialIds: reader.memberships.map((membership) => membership.trialId),
      },
    },
  );
}

/** Subjects of the reader's sites that wait for dosing or for an outcome: one statement. */
async function subjectRows(reader: TrialReader): Promise<SubjectRow[]> {
  const pairs = reader.memberships
    .filter((membership) => roleMay(membership.role, 'subject.record'))
    .flatMap(({ trialId, siteIds }) => siteIds.map((siteId) => [trialId, siteId]));
  if (pairs.length === 0) return [];
  return sequelize().query(
    `SELECT s.trial_id AS trialId, c.number AS cohortNumber, s.code, s.state,
       s.reserved_at AS reservedAt, s.window_ends_at AS windowEndsAt
     FROM subjects s JOIN cohorts c ON c.id = s.cohort_id
     WHERE s.state IN ('reserved', 'dosed') AND (s.trial_id, s.site_id) IN (:pairs)
     ORDER BY COALESCE(s.window_ends_at, s.reserved_at), s.code`,
    { type: QueryTypes.SELECT, replacements: { pairs } },
  );
}

const iso = (date: Date | null): string | null => date?.toISOString() ?? null;

type Line = Omit<Waiting, 'trialCode' | 'trialTitle'>;

function forReviewer(trial: TrialFactsRow, base: string): Line[] {
  const lines: Line[] = [];
  if (trial.haltedAt && !trial.hasSignedLift) {
    lines.push({
      what: 'The trial is halted. Lifting it needs the quorum.',
      href: `${base}/review`,
      at: iso(trial.haltedAt),
      isOverdue: false,
    });
  }
  if (trial.submittedAt) {
    lines.push({
      what: 'A design waits for approval.',
      href: `${base}/design`,
      at: iso(trial.submittedAt),
      isOverdue: false,
    });
  }
  if (trial.recommendationNumber !== null && !trial.hasSigned) {
    lines.push({
      what:
        trial.recommendationNumber === 1
          ? 'The starting dose waits for signatures.'
          : `Cohort ${trial.recommendationNumber - 1} is complete. What follows waits for signatures.`,
      href: `${base}/review`,
      at: iso(trial.recommendationAt),
      isOverdue: false,
    });
  }
  return lines;
}

function forStatistician(trial: TrialFactsRow, base: string): Line[] {
  if (trial.state !== 'draft') return [];
  const what = trial.returnedReason
    ? 'The design was returned. Read the reason and change it.'
    : trial.draftId
      ? 'The design is a draft. Submit it when it is ready.'
      : 'The design is not written yet.';
  return [{ what, href: `${base}/design`, at: null, isOverdue: false }];
}

function forSite(trial: TrialFactsRow, base: string, subjects: readonly SubjectRow[], now: string): Line[] {
  const href = `${base}/cohorts/${trial.cohortNumber}`;
  const lines: Line[] = [];
  if (trial.state === 'halted') {
    lines.push({
      what: 'The trial is halted. Nobody is dosed.',
      href,
      at: iso(trial.haltedAt),
      isOverdue: false,
    });
  }
  if (trial.cohortState === 'open' && trial.isRecordsOnly) {
    lines.push({
      what: `Cohort ${trial.cohortNumber} was returned with questions. Answer, correct and resubmit it.`,
      href,
      at: null,
      isOverdue: false,
    });
  }
  for (const subject of subjects.filter((each) => each.trialId === trial.id)) {
    const at = iso(subject.windowEndsAt);
    const isOver = at !== null && at <= now;
    lines.push(
      subject.state === 'reserved'
        ? {
            what: `${subject.code}: reserved, not dosed yet.`,
            href,
            at: iso(subject.reservedAt),
            isOverdue: false,
          }
        : {
            what: isOver
              ? `${subject.code}: the window has ended. Record the outcome.`
              : `${subject.code}: in the observation window.`,
            href,
            at,
            isOverdue: isOver,
          },
    );
  }
  const free = (trial.cohortSize ?? 0) - Number(trial.placesTaken);
  if (
    trial.state === 'open' &&
    trial.cohortState === 'open' &&
    !trial.isRecordsOnly &&
    !trial.isClosedShort &&
    free > 0
  ) {
    lines.push({
      what: `Cohort ${trial.cohortNumber}: ${free === 1 ? 'one place is' : `${free} places are`} free.`,
      href,
      at: null,
      isOverdue: false,
    });
  }
  return lines;
}

function linesFor(
  role: TrialRole,
  trial: TrialFactsRow,
  subjects: readonly SubjectRow[],
  now: string,
): Line[] {
  const base = `/trials/${trial.code}`;
  if (role === 'reviewer') return forReviewer(trial, base);
  if (role === 'statistician') return forStatistician(trial, base);
  if (roleMay(role, 'subject.record')) return forSite(trial, base, subjects, now);
  if (role === 'sponsor' && trial.haltedAt) {
    return [
      { what: 'The trial is halted.', href: `${base}/summary`, at: iso(trial.haltedAt), isOverdue: false },
    ];
  }
  return [];
}

function trialLine(reader: TrialReader, trial: TrialFactsRow): TrialLine {
  const role = reader.memberships.find(({ trialId }) => trialId === trial.id)?.role;
  return {
    code: trial.code,
    title: trial.title,
    state: trial.state,
    roleName: role ? ROLE_NAMES[role] : '',
    cohortNumber: trial.cohortNumber,
    cohortState: trial.cohortState,
  };
}

/** The trials a reader has a role in. One statement. */
export async function readersTrials(reader: TrialReader): Promise<TrialLine[]> {
  if (reader.memberships.length === 0) return [];
  return (await trialRows(reader)).map((trial) => trialLine(reader, trial));
}

/** What waits for a reader in all their trials, and those trials. Two statements. */
export async function today(reader: TrialReader): Promise<TodayView> {
  if (reader.memberships.length === 0) return { waiting: [], trials: [] };
  const [trials, subjects] = await Promise.all([trialRows(reader), subjectRows(reader)]);
  const roleOf = new Map(reader.memberships.map(({ trialId, role }) => [trialId, role]));
  const waiting = trials.flatMap((trial) => {
    const role = roleOf.get(trial.id);
    if (!role) return [];
    return linesFor(role, trial, subjects, reader.now).map((line) => ({
      ...line,
      trialCode: trial.code,
      trialTitle: trial.title,
    }));
  });
  return {
    waiting: waiting.sort((a, b) => Number(b.isOverdue) - Number(a.isOverdue)),
    trials: trials.map((trial) => trialLine(reader, trial)),
  };
}
