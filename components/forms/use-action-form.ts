'use client';

import { unstable_rethrow } from 'next/navigation';
import { useCallback, useId, useMemo, useRef, useState, useTransition, useSyncExternalStore } from 'react';
import {
  set,
  useForm,
  type DefaultValues,
  type FieldErrors,
  type FieldPath,
  type FieldValues,
  type Mode,
  type UseFormReturn,
} from 'react-hook-form';
import type { z } from 'zod';
import type { ActionRefusal, ActionResult, Submission } from '@/lib/schemas/action-result';
import type { FieldFacts, FormContextValue } from './form-context';
import { makeResolver, type SchemaSource } from './form-resolver';
import { problemsOf, valuesToSend, type FieldProblem } from './form-values';

/** How the last attempt to send ended. `lost`: no answer came, so nobody knows whether it was recorded. */
export type FormOutcome<Value> =
  | { kind: 'none' }
  | { kind: 'invalid'; problems: FieldProblem[] }
  | { kind: 'refused'; refusal: ActionRefusal; problems: FieldProblem[] }
  | { kind: 'lost' }
  | { kind: 'saved'; value: Value };

/** What `<ActionForm>` and the page need of a form. */
export interface ActionFormState<Values extends FieldValues = FieldValues, Value = unknown> {
  form: UseFormReturn<Values>;
  parts: FormContextValue;
  outcome: FormOutcome<Value>;
  pending: boolean;
  /** Checks, sends, and shows the answer. A second call while one is under way does nothing. */
  submit: (event?: { preventDefault: () => void }) => void;
  /** Fetches the schema ahead of its first use; called when the form is first focused. */
  prepare: () => void;
}

/** A server action a form can send to: the values as typed and a submission key, for a value or a refusal. */
export type FormAction<Schema extends z.ZodType<unknown, FieldValues>, Value> = (
  input: z.input<Schema> & Submission,
) => Promise<ActionResult<Value>>;

/** What a form over a server action is made of. The schema is the one of the first render. */
export interface ActionFormOptions<Schema extends z.ZodType<unknown, FieldValues>, Value> {
  /** The schema the action parses its input with, or how to fetch it; what it refuses here is not sent. */
  schema: SchemaSource<Schema>;
  action: FormAction<Schema, Value>;
  defaultValues: DefaultValues<z.input<Schema>>;
  /** Called once with what the action gave back: close a panel, go to another page. */
  onSaved?: (value: Value) => void;
  /** Puts the default values back after success, for a form that records one thing after another. */
  clearWhenSaved?: boolean;
  /** When fields are checked before the first attempt to send; default: not before. */
  checkWhile?: Extract<Mode, 'onSubmit' | 'onChange' | 'onTouched'>;
}

const never = () => () => {};

/**
 * A form over a server action: checked by the action's own schema, sent once per submission key, and coming back
 * from a refusal with every value typed, passwords excepted.
 * Every value in `defaultValues` must be set; a number field starts as a number or as ''.
 */
export function useActionForm<Schema extends z.ZodType<unknown, FieldValues>, Value>({
  schema,
  action,
  defaultValues,
  onSaved,
  clearWhenSaved = false,
  checkWhile = 'onSubmit',
}: ActionFormOptions<Schema, Value>): ActionFormState<z.input<Schema>, Value> {
  type Values = z.input<Schema>;
  const id = useId();
  const ready = useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
  const [fields] = useState(() => new Map<string, FieldFacts>());
  const submissionKey = useRef<string | null>(null);
  const underWay = useRef(false);
  const [pending, startTransition] = useTransition();
  const [outcome, setOutcome] = useState<FormOutcome<Value>>({ kind: 'none' });

  const [{ resolve, prepare }] = useState(() => makeResolver(schema, () => fields));
  const form = useForm<Values>({
    resolver: resolve,
    defaultValues,
    mode: checkWhile,
    reValidateMode: 'onChange',
    shouldFocusError: false,
  });

  const register = useCallback(
    (name: string, facts: FieldFacts) => {
      fields.set(name, facts);
      return () => {
        fields.delete(name);
      };
    },
    [fields],
  );

  function emptySecrets() {
    for (const [name, { secret }] of fields) {
      if (secret) form.resetField(name as FieldPath<Values>, { keepError: true, defaultValue: '' as never });
    }
  }

  function showRefusal(refusal: ActionRefusal) {
    for (const [name, message] of Object.entries(refusal.fields ?? {})) {
      form.setError(name as FieldPath<Values>, { type: 'server', message });
    }
    const errors: Record<string, unknown> = {};
    for (const [name, message] of Object.entries(refusal.fields ?? {})) set(errors, name, { message });
    setOutcome({ kind: 'refused', refusal, problems: problemsOf(errors as FieldErrors, fields) });
  }

  async function send() {
    submissionKey.current ??= crypto.randomUUID();
    const input = {
      ...valuesToSend(form.getValues(), fields),
      submissionKey: submissionKey.current,
    };
    let result: ActionResult<Value>;
    try {
      result = await action(input);
    } catch (error) {
      unstable_rethrow(error);
      setOutcome({ kind: 'lost' });
      return;
    } finally {
      underWay.current = false;
    }
    emptySecrets();
    if (!result.ok) {
      showRefusal(result);
      return;
    }
    submissionKey.current = null;
    if (clearWhenSaved) form.reset();
    else form.reset(form.getValues());
    setOutcome({ kind: 'saved', value: result.value });
    onSaved?.(result.value);
  }

  function submit(event?: { preventDefault: () => void }) {
    event?.preventDefault();
    if (underWay.current) return;
    underWay.current = true;
    const attempt = form.handleSubmit(
      () => startTransition(send),
      (errors) => {
        underWay.current = false;
        setOutcome({ kind: 'invalid', problems: problemsOf(errors, fields) });
      },
    );
    attempt().catch((error: unknown) => {
      underWay.current = false;
      throw error;
    });
  }

  const parts = useMemo(() => ({ id, pending, ready, register }), [id, pending, ready, register]);
  return { form, parts, outcome, pending, submit, prepare };
}
