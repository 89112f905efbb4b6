'use client';

import { useState } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';

/** The variant chosen of a group of settings, and how to choose another. */
export interface KeptVariants {
  readonly chosen: string;
  readonly choose: (variant: string) => void;
}

/**
 * One of several groups of settings at one path of a form, such as the rule with its own settings. The form holds the chosen
 * group only, as the schema wants it; what was typed in the others is kept beside it and comes back when they are chosen.
 * @param variantOf the name of the variant a value is
 * @param fresh the settings of a variant that was never chosen
 */
export function useKeptVariants(
  name: string,
  variantOf: (value: unknown) => string,
  fresh: (variant: string) => unknown,
): KeptVariants {
  const { control, getValues, setValue, clearErrors } = useFormContext();
  const [kept] = useState(() => new Map<string, unknown>());
  const chosen = variantOf(useWatch({ control, name }));
  const choose = (variant: string) => {
    if (variant === chosen) return;
    kept.set(chosen, structuredClone(getValues(name)));
    clearErrors(name);
    setValue(name, kept.has(variant) ? kept.get(variant) : fresh(variant), { shouldDirty: true });
  };
  return { chosen, choose };
}

/** The variant of a value that is either null or has one of several kinds. */
export function kindOf(value: unknown, absent = 'none'): string {
  if (typeof value !== 'object' || value === null) return absent;
  return 'kind' in value ? String(value.kind) : 'used';
}
