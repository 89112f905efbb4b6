import { z } from 'zod';
import { canonicalDecimal } from '@/lib/design/decimal';

/** Digits a dose may have before and after the point: what DECIMAL(20,10) holds exactly. */
export const DOSE_INTEGER_DIGITS = 10;
export const DOSE_DECIMAL_DIGITS = 10;
/** Longest text read as a dose; anything longer is refused unread. */
export const DOSE_TEXT_LENGTH = 40;

const PLAIN_DECIMAL = /^\d+(\.\d+)?$/;

/** Why a text is no dose, as a sentence a person can act on; null when it is one. */
export function doseProblem(text: string): string | null {
  if (text.length > DOSE_TEXT_LENGTH) {
    return `This is ${text.length} characters long; a dose has at most ${DOSE_INTEGER_DIGITS} digits before and ${DOSE_DECIMAL_DIGITS} after the point. Shorten it.`;
  }
  const trimmed = text.replace(/^ +| +$/g, '');
  if (trimmed === '') return 'The dose is missing. Enter a decimal number, for example 12.5.';
  if (/^[+-]/.test(trimmed)) {
    return 'A dose is zero or positive and is written without a sign. Enter digits only, for example 12.5.';
  }
  if (/^\d+,\d+$/.test(trimmed)) {
    return 'The decimal mark is a point. Enter 12.5, not 12,5.';
  }
  if (/^\d+(\.\d+)?[eE]/.test(trimmed)) {
    return 'A dose is written out in full, without an exponent. Enter 1000, not 1e3.';
  }
  if (!PLAIN_DECIMAL.test(trimmed)) {
    return 'This is not a decimal number. Enter digits with at most one decimal point, for example 12.5.';
  }
  const [whole = '', fraction = ''] = trimmed.split('.');
  if (whole.replace(/^0+/, '').length > DOSE_INTEGER_DIGITS) {
    return `A dose has at most ${DOSE_INTEGER_DIGITS} digits before the point. Choose a larger unit.`;
  }
  if (fraction.replace(/0+$/, '').length > DOSE_DECIMAL_DIGITS) {
    return `A dose has at most ${DOSE_DECIMAL_DIGITS} digits after the point. Choose a smaller unit or round it.`;
  }
  return null;
}

/**
 * A dose in the trial's unit: an exact decimal ≥ 0 as canonical text ("0.30" is read as "0.3"), at most ten
 * digits before and ten after the point. Numbers are refused: a double cannot carry a decimal exactly.
 */
export const doseSchema = z
  .string({
    error: (issue) =>
      issue.input === undefined
        ? 'The dose is missing. Enter a decimal number, for example 12.5.'
        : 'A dose is given as text so that its decimals are exact, for example "12.5". Put it in quotation marks.',
  })
  .transform((text, context) => {
    const problem = doseProblem(text);
    if (problem !== null) {
      context.issues.push({ code: 'custom', message: problem, input: text.slice(0, DOSE_TEXT_LENGTH) });
      return z.NEVER;
    }
    return canonicalDecimal(text.trim());
  });

/** Canonical decimal text of a dose. Compare doses with `lib/design/decimal.ts`, never as texts. */
export type Dose = z.output<typeof doseSchema>;
