'use client';

import { createContext, useContext, useEffect } from 'react';

/** What the form must know of one of its fields, beside its value. */
export interface FieldFacts {
  /** The label, to name the field in the summary of what is wrong. */
  label: string;
  /** Emptied after every answer of the server, and never kept. */
  secret?: boolean;
  /** Why a text in it cannot be read as its value, as a sentence; null when it can. Keep the function between renders. */
  unreadable?: (text: string) => string | null;
  /** What an empty field is sent as; left out, it is sent as empty text. */
  emptyAs?: undefined | null;
}

/** What the fields and buttons of a form share. */
export interface FormContextValue {
  /** Prefix of the fields' element ids. */
  id: string;
  pending: boolean;
  /** False until the page's scripts run: a form cannot be sent before. */
  ready: boolean;
  register: (name: string, facts: FieldFacts) => () => void;
}

export const ActionFormContext = createContext<FormContextValue | null>(null);

/** The form around a field; throws outside one. */
export function useFormParts(): FormContextValue {
  const parts = useContext(ActionFormContext);
  if (!parts) throw new Error('A field or submit button stands outside <ActionForm>.');
  return parts;
}

/** The element id of a field, by which the summary finds it. */
export function fieldId(formId: string, name: string): string {
  return `${formId}-${name}`;
}

/** Tells the form about a field while it is on the page; returns the field's element id. */
export function useFieldFacts(name: string, { label, secret, unreadable, ...rest }: FieldFacts): string {
  const { id, register } = useFormParts();
  const emptyKnown = 'emptyAs' in rest;
  const { emptyAs } = rest;
  useEffect(
    () => register(name, { label, secret, unreadable, ...(emptyKnown ? { emptyAs } : {}) }),
    [register, name, label, secret, unreadable, emptyKnown, emptyAs],
  );
  return fieldId(id, name);
}
