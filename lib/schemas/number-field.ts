import { z } from 'zod';

/** The span of a number field. `above`/`below` exclude the end, `minimum`/`maximum` include it. */
export interface Span {
  above?: number;
  below?: number;
  minimum?: number;
  maximum?: number;
}

function spanText({ above, below, minimum, maximum }: Span): string {
  const low = above !== undefined ? `above ${above}` : minimum !== undefined ? `at least ${minimum}` : '';
  const high = below !== undefined ? `below ${below}` : maximum !== undefined ? `at most ${maximum}` : '';
  return [low, high].filter(Boolean).join(' and ');
}

/**
 * A finite number within a span. A refusal names the field, what was given, what holds and what to do:
 * "The target is 1.2; it must be above 0 and below 1. Enter a probability such as 0.25."
 */
export function numberField(name: string, span: Span, advice: string, { integer = false } = {}) {
  const holds = `must be ${integer ? 'a whole number' : 'a number'}${spanText(span) ? ` ${spanText(span)}` : ''}`;
  const error = (issue: { input?: unknown }) => {
    const { input } = issue;
    const wrong =
      input === undefined || input === null
        ? 'is missing'
        : typeof input !== 'number' || Number.isNaN(input)
          ? 'is not a number'
          : Number.isFinite(input)
            ? `is ${input}`
            : 'is too large to be a number here';
    return `${name} ${wrong}; it ${holds}. ${advice}`;
  };
  let schema = integer ? z.number({ error }).int({ error }) : z.number({ error });
  if (span.above !== undefined) schema = schema.gt(span.above, { error });
  if (span.below !== undefined) schema = schema.lt(span.below, { error });
  if (span.minimum !== undefined) schema = schema.gte(span.minimum, { error });
  if (span.maximum !== undefined) schema = schema.lte(span.maximum, { error });
  return schema;
}

/** A whole number within a span, refused in the same words. */
export function wholeNumberField(name: string, span: Span, advice: string) {
  return numberField(name, span, advice, { integer: true });
}

/** The error of a strict object: names settings it does not have, or says that the whole is missing. */
export function objectError(name: string) {
  return (issue: { code?: string; input?: unknown; keys?: string[] }) =>
    issue.code === 'unrecognized_keys'
      ? `${name} has no setting named ${(issue.keys ?? [])
          .slice(0, 3)
          .map((key) => `"${key.slice(0, 40)}"`)
          .join(', ')}. Remove it.`
      : `${name} ${issue.input == null ? 'is missing' : 'is not a group of settings'}. Fill it in.`;
}
