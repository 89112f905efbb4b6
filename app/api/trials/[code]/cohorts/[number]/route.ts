import { cohortPage } from '@/lib/queries/trial/cohort-page';
import { cohortRevisionSchema } from '@/lib/schemas/cohort-revision';
import { hidden } from '@/lib/server/hidden';
import { trialRoute } from '@/lib/server/route';

/** Says which state of a cohort its page would show the reader now, so that an open page knows that it is older. */
export const GET = trialRoute({
  permission: 'cohort.read',
  response: cohortRevisionSchema,
  handle: async ({ reader, params }) => {
    const view = await cohortPage(reader, params.code ?? '', params.number ?? '');
    if (view === null) throw hidden();
    return { number: view.cohort.number, revision: view.revision };
  },
});
