import 'server-only';
import { RefusedError } from '@/lib/errors';

/** What a trial, an address or a record that is not the reader's answers: as if it did not exist. */
export function hidden(): RefusedError {
  return new RefusedError({
    code: 'not-found',
    message: 'There is nothing at this address, or it is not yours to see.',
  });
}
