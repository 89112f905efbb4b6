'use client';

import dynamic from 'next/dynamic';

/*
 * The forms of a cohort's page, loaded only by a page that shows one: a cohort that is complete, or only read, is drawn
 * without the code of forms.
 */

export const LoadedSubjectActs = dynamic(() => import('./subject-acts').then((module) => module.SubjectActs));

export const LoadedReserveForm = dynamic(() => import('./reserve-form').then((module) => module.ReserveForm));

export const LoadedResubmitForm = dynamic(() =>
  import('./resubmit-form').then((module) => module.ResubmitForm),
);
