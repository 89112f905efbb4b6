import { trialCommandRoute } from '@/lib/server/trial-command-route';

/** Runs one command of a trial, as the forms do; for drafts that are sent again. */
export const POST = trialCommandRoute;
