import { get, set, type FieldErrors, type FieldValues } from 'react-hook-form';
import type { FieldFacts } from './form-context';

/** A field and what is wrong with it, as the summary lists it. */
export interface FieldProblem {
  name: string;
  label: string;
  message: string;
}

/** The fields on the page, by their path. */
export type KnownFields = ReadonlyMap<string, FieldFacts>;

/** The values as they are checked and sent: a copy, with empty fields as the value each of them stands for. */
export function valuesToSend<T extends FieldValues>(values: T, fields: KnownFields): T {
  const copy = structuredClone(values);
  for (const [name, facts] of fields) {
    if ('emptyAs' in facts && get(copy, name) === '') set(copy, name, facts.emptyAs);
  }
  return copy;
}

/** The sentences for fields whose text cannot be read as their value (a number, a time), by path. */
export function unreadableValues(values: FieldValues, fields: KnownFields): Map<string, string> {
  const sentences = new Map<string, string>();
  for (const [name, facts] of fields) {
    const value: unknown = get(values, name);
    if (typeof value !== 'string' || value === '') continue;
    const sentence = facts.unreadable?.(value) ?? null;
    if (sentence !== null) sentences.set(name, sentence);
  }
  return sentences;
}

/** Everything that is wrong, in the order of the page; problems of no known field come last. */
export function problemsOf(errors: FieldErrors, fields: KnownFields): FieldProblem[] {
  const found = new Map<string, string>();
  collect(errors, '', found);
  const problems: FieldProblem[] = [];
  for (const [name, { label }] of fields) {
    const message = found.get(name) ?? found.get(`${name}.root`);
    if (message !== undefined) problems.push({ name, label, message });
    found.delete(name);
    found.delete(`${name}.root`);
  }
  for (const [name, message] of found) problems.push({ name, label: '', message });
  return problems;
}

function collect(node: unknown, path: string, found: Map<string, string>): void {
  if (typeof node !== 'object' || node === null) return;
  if ('message' in node && typeof node.message === 'string' && node.message !== '') {
    found.set(path, node.message);
  }
  for (const [key, child] of Object.entries(node)) {
    if (key === 'ref' || key === 'types') continue;
    collect(child, path === '' ? key : `${path}.${key}`, found);
  }
}
