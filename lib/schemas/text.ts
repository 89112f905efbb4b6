import { z } from 'zod';

/** Control, format (bidi marks, zero-width), surrogate and line-separator characters, which could disguise a text. */
const HIDDEN = /[\p{Cc}\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/u;
const HIDDEN_BUT_LINE_BREAKS = /[^\P{Cc}\n]|[\p{Cf}\p{Cs}\p{Zl}\p{Zp}]/u;

/**
 * A text a person typed: trimmed, in Unicode's composed form (NFC), `minimum` to `maximum` characters, without
 * control characters or marks that turn the direction of text. Line breaks only where `lines` is true.
 * `name` begins the sentences of a refusal ("The label of a response").
 */
export function plainText(name: string, maximum: number, { minimum = 1, lines = false } = {}) {
  const span = minimum === 0 ? `at most ${maximum} characters` : `${minimum} to ${maximum} characters`;
  return z
    .string({
      error: (issue) => `${name} is ${issue.input == null ? 'missing' : 'not a text'}. Enter ${span}.`,
    })
    .max(maximum * 4, { error: `${name} is too long; it has ${span}. Shorten it.` })
    .transform((text) =>
      text
        .replace(/\r\n?/g, lines ? '\n' : '\r')
        .trim()
        .normalize('NFC'),
    )
    .pipe(
      z
        .string()
        .min(minimum, {
          error: `${name} is ${minimum === 1 ? 'empty' : 'too short'}; it has ${span}. Enter it.`,
        })
        .max(maximum, {
          error: (issue) =>
            `${name} has ${String(issue.input).length} characters; it has ${span}. Shorten it.`,
        })
        .refine((text) => !(lines ? HIDDEN_BUT_LINE_BREAKS : HIDDEN).test(text), {
          error: `${name} contains a control character or a mark that hides or turns text. Type it again without it.`,
        }),
    );
}
