'use client';

import { useEffect, useRef } from 'react';
import { get, useFormContext, useFormState } from 'react-hook-form';
import { problemsOf } from '@/components/forms/form-values';

/** How long after the last change entries are checked. */
const PAUSE = 250;

/**
 * Checks entries as one types: those that were changed, and those that were refused before, since a change of one setting
 * may mend or break another. Entries nobody has touched are left alone until the form is sent, and what the server refused
 * stands until its own field is changed.
 */
export function LiveCheck() {
  const { control, trigger, watch, getValues } = useFormContext();
  const { errors, isSubmitting } = useFormState({ control });
  const refused = useRef<string[]>([]);
  const waiting = useRef<{ names: Set<string>; timer?: ReturnType<typeof setTimeout> }>({ names: new Set() });
  useEffect(() => {
    refused.current = problemsOf(errors, new Map())
      .map(({ name }) => name.replace(/\.root$/, ''))
      .filter((name) => (get(errors, name) as { type?: unknown } | undefined)?.type !== 'server');
  });
  useEffect(() => {
    // Sending checks everything: a check still waiting would only wipe what the server answers.
    if (!isSubmitting) return;
    clearTimeout(waiting.current.timer);
    waiting.current.names.clear();
  }, [isSubmitting]);
  useEffect(() => {
    const pending = waiting.current;
    const subscription = watch((_values, { name }) => {
      if (name !== undefined && isLeaf(getValues(name))) pending.names.add(name);
      clearTimeout(pending.timer);
      pending.timer = setTimeout(() => {
        const names = [...new Set([...pending.names, ...refused.current])].filter((each) => each !== '');
        if (names.length > 0) void trigger(names);
      }, PAUSE);
    });
    return () => {
      clearTimeout(pending.timer);
      subscription.unsubscribe();
    };
  }, [watch, trigger, getValues]);
  return null;
}

function isLeaf(value: unknown): boolean {
  return typeof value !== 'object' && value !== undefined;
}
