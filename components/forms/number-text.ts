/** What a person typed in a number field: the number, or the sentence that refuses it. */
export type NumberReading = { ok: true; value: number } | { ok: false; sentence: string };

/** The most significant digits a double carries through without loss. */
export const EXACT_DIGITS = 15;

const PLAIN = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

/**
 * Reads a number exactly as it was typed: digits, one point, an optional sign and exponent. Nothing is guessed:
 * a comma, a grouping space, a unit, or more digits than can be kept are refused with a sentence.
 * @param text what was typed, not empty; blanks around it and a typographic minus are allowed
 */
export function readNumber(text: string): NumberReading {
  const trimmed = text.trim().replace(/^\u2212/, '-');
  if (/^[+-]?\d+,\d+$/.test(trimmed)) {
    return refused(`Write a point, not a comma: ${trimmed.replace(',', '.')} instead of ${trimmed}.`);
  }
  if (/^[+-]?\d{1,3}([ ,.'\u00a0\u202f]\d{3})+([.,]\d+)?$/.test(trimmed) && !PLAIN.test(trimmed)) {
    return refused('Write the number without spaces, commas or other marks between its digits.');
  }
  if (!PLAIN.test(trimmed)) {
    const number = /^[+-]?(\d+\.?\d*|\.\d+)/.exec(trimmed)?.[0];
    return refused(
      number
        ? `Write the number alone: ${number} without “${trimmed.slice(number.length).trim().slice(0, 20)}”.`
        : 'This is not a number. Write digits, with a point for decimals, such as 1.5.',
    );
  }
  const mantissa = trimmed.split(/e/i)[0] ?? '';
  const digits = mantissa
    .replaceAll(/[+\-.]/g, '')
    .replace(/^0+/, '')
    .replace(/0+$/, '');
  if (digits.length > EXACT_DIGITS) {
    return refused(`Write at most ${EXACT_DIGITS} significant digits; more cannot be kept exactly.`);
  }
  const value = Number(trimmed);
  if (!Number.isFinite(value)) return refused('This number is too large to be kept.');
  if (value === 0 && digits !== '') return refused('This number is too small to be kept.');
  return { ok: true, value: value === 0 ? 0 : value };
}

function refused(sentence: string): NumberReading {
  return { ok: false, sentence };
}

/** The text in which a number is put back into its field. */
export function textOfNumber(value: unknown): string {
  if (typeof value === 'number') return Number.isFinite(value) ? String(value) : '';
  return typeof value === 'string' ? value : '';
}
