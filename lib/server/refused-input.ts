import type { z } from 'zod';
import type { Refusal } from '@/lib/errors';

/** The most fields named in one refusal. */
const MOST_FIELDS = 50;

/**
 * The refusal of an input: the first sentence for each refused field, keyed by its path (`doses.levels.2`).
 * What concerns no single field stands in the message.
 */
export function refusedInput(error: z.ZodError): Refusal {
  const fields: Record<string, string> = Object.create(null) as Record<string, string>;
  let general: string | null = null;
  for (const issue of error.issues) {
    const path = issue.path.map(String).join('.').slice(0, 200);
    if (path === '') general ??= issue.message;
    else if (Object.keys(fields).length < MOST_FIELDS) fields[path] ??= issue.message;
  }
  const named = Object.keys(fields).length;
  const message =
    general !== null
      ? `Nothing was recorded. ${general}`
      : named === 1
        ? 'Nothing was recorded. One entry needs a change.'
        : `Nothing was recorded. ${named} entries need a change.`;
  return { code: 'invalid', message, fields: { ...fields } };
}
