'use client';

import { useEffect, useRef } from 'react';
import { useFormContext, useFormState } from 'react-hook-form';
import { problemsOf } from '@/components/forms/form-values';

/** How long after the last change entries are checked. */
const PAUSE = 250;

/**
 * Checks entries as one types: those that were changed, and those that were refused before, since a change of one setting
 * may mend or break another. Entries nobody has touched are left alone until the form is sent.
 */
export function LiveCheck() {
  const { control, trigger, watch, getValues } = useFormContext();
  const { errors } = useFormState({ control });
  const refused = useRef<string[]>([]);
  useEffect(() => {
    refused.current = problemsOf(errors, new Map()).map(({ name }) => name.replace(/\.root$/, ''));
  });
  useEffect(() => {
    const changed = new Set<string>();
    let timer: ReturnType<typeof setTimeout> | undefined;
    const subscription = watch((_values, { name }) => {
      if (name !== undefined && isLeaf(getValues(name))) changed.add(name);
      clearTimeout(timer);
      timer = setTimeout(() => {
        const names = [...new Set([...changed, ...refused.current])].filter((each) => each !== '');
        if (names.length > 0) void trigger(names);
      }, PAUSE);
    });
    return () => {
      clearTimeout(timer);
      subscription.unsubscribe();
    };
  }, [watch, trigger, getValues]);
  return null;
}

function isLeaf(value: unknown): boolean {
  return typeof value !== 'object' && value !== undefined;
}
