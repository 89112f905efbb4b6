import type { ReactNode } from 'react';
import type { CohortActions, CohortWork, PlaceData } from './cohort-data';
import { LoadedReserveForm, LoadedSubjectActs } from './loaded-forms';
import { SavedNotice } from './saved-notice';
import { hasWindowEnded, SubjectFacts, SubjectStanding } from './subject-facts';

/** What the reader may reserve: their sites, and why not now. */
export interface ReserveData {
  readonly sites: readonly { readonly id: string; readonly name: string; readonly code: string }[];
  readonly why: string | null;
}

const spotOf = (place: number) => `place-${place}`;

/** The place whose act is the next of the page: an outcome due, then a dosing, then the first free place. */
function nextPlace(places: readonly PlaceData[], readAt: string, reserve: ReserveData | null): number | null {
  const own = places.flatMap((each) => (each.holder === 'own' ? [each] : []));
  const due = own.find(({ subject }) => subject.state === 'dosed' && hasWindowEnded(subject, readAt));
  const undosed = own.find(({ subject }) => subject.acts.recordDosing?.why === null);
  const free = reserve ? places.find((each) => each.holder === 'nobody') : undefined;
  return (due ?? undosed ?? free)?.place ?? null;
}

function Place({
  number,
  heading,
  aside,
  children,
}: {
  number: number;
  heading: ReactNode;
  aside?: ReactNode;
  children?: ReactNode;
}) {
  return (
    <li className={`border-t border-line ${children ? 'py-4' : 'py-2.5'}`}>
      <div className="flex flex-wrap items-baseline gap-x-3 gap-y-1">
        <span className="text-xs text-ink-soft">Place {number}</span>
        {heading}
        {aside ? <span className="ml-auto">{aside}</span> : null}
      </div>
      <SavedNotice spot={spotOf(number)} />
      {children ? <div className="mt-1.5">{children}</div> : null}
    </li>
  );
}

/**
 * The places of a cohort as a site works on them: its own subjects with their next act, others' places without a code,
 * the first free one with the form that reserves it.
 */
export function PlaceList({
  work,
  cohortId,
  places,
  reserve,
  isOpen,
  actions,
}: {
  work: CohortWork;
  cohortId: string;
  places: readonly PlaceData[];
  reserve: ReserveData | null;
  isOpen: boolean;
  actions: CohortActions;
}) {
  const next = nextPlace(places, work.readAt, reserve);
  const firstFree = places.find((each) => each.holder === 'nobody')?.place;
  return (
    <ol>
      {places.map((each) => {
        const spot = spotOf(each.place);
        if (each.holder === 'another-site') {
          return (
            <Place
              key={each.place}
              number={each.place}
              heading={<span className="text-ink-soft">taken by another site</span>}
            />
          );
        }
        if (each.holder === 'nobody') {
          return (
            <Place
              key={each.place}
              number={each.place}
              heading={<span className="text-ink-soft">{isOpen ? 'free' : 'not used'}</span>}
            >
              {reserve && each.place === firstFree ? (
                <LoadedReserveForm
                  trialCode={work.trialCode}
                  cohortId={cohortId}
                  sites={reserve.sites}
                  why={reserve.why}
                  spot={spot}
                  action={actions.reserveSlot}
                  isPrimary={each.place === next}
                />
              ) : null}
            </Place>
          );
        }
        const { subject } = each;
        return (
          <Place
            key={each.place}
            number={each.place}
            heading={
              <>
                <h3 className="font-mono text-md font-semibold">{subject.code}</h3>
                <span className="text-sm text-ink-soft">{subject.site.name}</span>
              </>
            }
            aside={<SubjectStanding subject={subject} readAt={work.readAt} />}
          >
            <SubjectFacts work={work} subject={subject} />
            <LoadedSubjectActs
              key={subject.id}
              work={work}
              subject={subject}
              spot={spot}
              actions={actions}
              isPrimary={each.place === next}
            />
          </Place>
        );
      })}
    </ol>
  );
}
