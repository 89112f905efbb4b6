'use client';

import { zodResolver } from '@hookform/resolvers/zod';
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
  type Resolver,
  type UseFormReturn,
} from 'react-hook-form';
import type { z } from 'zod';
import type { ActionRefusal, ActionResult, Submission } from '@/lib/schemas/action-result';
import type { FieldFacts, FormContextValue } from './form-context';
import { problemsOf, unreadableValues, valuesToSend, type FieldProblem } from './form-values';

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
}

/** What a form over a server action is made of. */
export interface ActionFormOptions<Schema extends z.ZodType<unknown, FieldValues>, Value> {
  /** The schema the action parses its input with; what it refuses here is not sent. */
  schema: Schema;
  /** The server action: takes the values as typed and a submission key. */
  action: (input: z.input<Schema> & Submission) => Promise<ActionResult<Value>>;
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
  const fields = useRef(new Map<string, FieldFacts>());
  const submissionKey = useRef<string | null>(null);
  const underWay = useRef(false);
  const [pending, startTransition] = useTransition();
  const [outcome, setOutcome] = useState<FormOutcome<Value>>({ kind: 'none' });

  const resolver = useMemo(() => {
    const bySchema = zodResolver(schema, undefined, { raw: true }) as unknown as Resolver<Values>;
    const resolve: Resolver<Values> = async (values, context, options) => {
      const result = await bySchema(valuesToSend(values, fields.current), context, options);
      const sentences = unreadableValues(values, fields.current);
      if (sentences.size === 0) return result;
      const errors = { ...result.errors };
      for (const [name, message] of sentences) set(errors, name, { type: 'unreadable', message });
      return { values: {}, errors: errors as FieldErrors<Values> };
    };
    return resolve;
  }, [schema]);

  const form = useForm<Values>({
    resolver,
    defaultValues,
    mode: checkWhile,
    reValidateMode: 'onChange',
    shouldFocusError: false,
  });

  const register = useCallback((name: string, facts: FieldFacts) => {
    fields.current.set(name, facts);
    return () => {
      fields.current.delete(name);
    };
  }, []);

  function emptySecrets() {
    for (const [name, { secret }] of fields.current) {
      if (secret) form.resetField(name as FieldPath<Values>, { keepError: true, defaultValue: '' as never });
    }
  }

  function showRefusal(refusal: ActionRefusal) {
    for (const [name, message] of Object.entries(refusal.fields ?? {})) {
      form.setError(name as FieldPath<Values>, { type: 'server', message });
    }
    const errors: Record<string, unknown> = {};
    for (const [name, message] of Object.entries(refusal.fields ?? {})) set(errors, name, { message });
    setOutcome({ kind: 'refused', refusal, problems: problemsOf(errors as FieldErrors, fields.current) });
  }

  async function send() {
    submissionKey.current ??= crypto.randomUUID();
    const input = {
      ...valuesToSend(form.getValues(), fields.current),
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
        setOutcome({ kind: 'invalid', problems: problemsOf(errors, fields.current) });
      },
    );
    attempt().catch((error: unknown) => {
      underWay.current = false;
      throw error;
    });
  }

  const parts = useMemo(() => ({ id, pending, ready, register }), [id, pending, ready, register]);
  return { form, parts, outcome, pending, submit };
}
