'use client';

import { useEffect, useRef } from 'react';
import { get, useFormContext, useFormState } from 'react-hook-form';
import { fieldId, useFormParts } from './form-context';
import type { FormOutcome } from './use-action-form';

function titleOf(count: number): string {
  return count === 1 ? 'Not sent. One entry needs a change.' : `Not sent. ${count} entries need a change.`;
}

/**
 * What stands in the way, on top of the form: the refusal's sentence and a link to each field concerned.
 * It takes the focus when an attempt fails, and loses a line as soon as its field is mended.
 */
export function ErrorSummary({ outcome }: { outcome: FormOutcome<unknown> }) {
  const { id } = useFormParts();
  const { control } = useFormContext();
  const { errors } = useFormState({ control });
  const box = useRef<HTMLDivElement>(null);
  const failed = outcome.kind === 'invalid' || outcome.kind === 'refused' || outcome.kind === 'lost';
  const problems =
    outcome.kind === 'invalid' || outcome.kind === 'refused'
      ? outcome.problems.filter(({ name }) => name === '' || get(errors, name))
      : [];
  // The fields learn of their errors a moment after the attempt has failed: the box is focused once it is there.
  const shown = failed && (outcome.kind !== 'invalid' || problems.length > 0);
  useEffect(() => {
    if (shown) box.current?.focus();
  }, [shown, outcome]);
  if (!shown) return null;

  return (
    <div
      ref={box}
      role="alert"
      tabIndex={-1}
      className="mb-5 border-l-4 border-brick bg-brick-wash px-3.5 py-2.5"
    >
      <p className="font-semibold text-brick">
        {outcome.kind === 'invalid' ? titleOf(problems.length) : null}
        {outcome.kind === 'refused' ? outcome.refusal.message : null}
        {outcome.kind === 'lost'
          ? 'No answer came from the server, so it is not known whether this was recorded. What you typed is still here: send it again, it is recorded only once.'
          : null}
      </p>
      {problems.length > 0 ? (
        <ul className="mt-1.5 grid gap-1">
          {problems.map(({ name, label, message }) => (
            <li key={name}>
              {label ? (
                <a
                  href={`#${encodeURIComponent(fieldId(id, name))}`}
                  className="underline underline-offset-3"
                  onClick={(event) => {
                    event.preventDefault();
                    focusField(fieldId(id, name));
                  }}
                >
                  {label}
                </a>
              ) : null}
              {label ? ': ' : null}
              {message}
            </li>
          ))}
        </ul>
      ) : null}
      {outcome.kind === 'refused' && outcome.refusal.code === 'signed-out' ? (
        <p className="mt-1.5">
          <a href="/sign-in" target="_blank" rel="noopener">
            Sign in in another tab
          </a>
        </p>
      ) : null}
      {outcome.kind === 'refused' && outcome.refusal.reference ? (
        <p className="mt-1.5 text-sm">
          Reference <code>{outcome.refusal.reference}</code>
        </p>
      ) : null}
    </div>
  );
}

/** Puts the focus on a field, or on the first control of a group of them. */
function focusField(elementId: string) {
  const element = document.getElementById(elementId);
  const target = element?.matches('fieldset')
    ? element.querySelector<HTMLElement>('input,select,textarea')
    : element;
  target?.focus();
  target?.scrollIntoView?.({ block: 'center' });
}
