import { set, type FieldErrors, type FieldValues, type Resolver } from 'react-hook-form';
import type { z } from 'zod';
import { unreadableValues, valuesToSend, type KnownFields } from './form-values';

/**
 * A schema, or how to fetch it. Fetched ones keep the schema library out of what a page loads at first; they are
 * fetched when the form is first focused or sent.
 */
export type SchemaSource<Schema extends z.ZodType<unknown, FieldValues>> = Schema | (() => Promise<Schema>);

/** A resolver for react-hook-form, and a call that fetches what it needs ahead of its first use. */
export interface FormResolver<Values extends FieldValues> {
  resolve: Resolver<Values>;
  prepare: () => void;
}

/**
 * Checks the values of a form by its schema, and by the fields that cannot read what was typed in them.
 * When a schema cannot be fetched (no connection) nothing is refused here: the action checks by the same schema.
 * @param fields gives the fields on the page at the time of the check
 */
export function makeResolver<Schema extends z.ZodType<unknown, FieldValues>>(
  source: SchemaSource<Schema>,
  fields: () => KnownFields,
): FormResolver<z.input<Schema>> {
  type Values = z.input<Schema>;
  let loading: Promise<Resolver<Values> | null> | undefined;

  async function fetchResolver(): Promise<Resolver<Values>> {
    const [{ zodResolver }, schema] = await Promise.all([
      import('@hookform/resolvers/zod'),
      typeof source === 'function' ? source() : source,
    ]);
    return zodResolver(schema, undefined, { raw: true }) as unknown as Resolver<Values>;
  }

  function load(): Promise<Resolver<Values> | null> {
    loading ??= fetchResolver().catch(() => {
      loading = undefined;
      return null;
    });
    return loading;
  }

  const resolve: Resolver<Values> = async (values, context, options) => {
    const bySchema = await load();
    const sent = valuesToSend(values, fields());
    const result = bySchema ? await bySchema(sent, context, options) : { values: sent, errors: {} };
    const sentences = unreadableValues(values, fields());
    if (sentences.size === 0) return result;
    const errors = { ...result.errors };
    for (const [name, message] of sentences) set(errors, name, { type: 'unreadable', message });
    return { values: {}, errors: errors as FieldErrors<Values> };
  };
  return { resolve, prepare: () => void load() };
}
