'use client';

import { FieldError, useFieldError } from './field-frame';
import { useFieldFacts } from './form-context';

/** The sentence that refuses a list as a whole ("levels must increase"), above or below its rows. */
export function GroupError({ name, label }: { name: string; label: string }) {
  const elementId = useFieldFacts(name, { label });
  const error = useFieldError(name);
  return (
    <div id={elementId} tabIndex={-1}>
      <FieldError elementId={elementId} error={error} />
    </div>
  );
}
