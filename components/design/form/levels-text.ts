import { DESIGN_LIMITS } from '@/lib/schemas/design-limits';

/** The longest text read as a list of levels. */
export const LEVELS_TEXT_LENGTH = 4000;

/** A pasted list of levels as texts, each checked later by the schema, or the sentence that refuses the list. */
export type LevelsReading =
  { readonly ok: true; readonly levels: string[] } | { readonly ok: false; readonly sentence: string };

/** Reads a list of levels: separated by commas, semicolons, blanks or line breaks. */
export function readLevels(text: string): LevelsReading {
  const { minimum, maximum } = DESIGN_LIMITS.levels;
  const holds = `A trial has ${minimum} to ${maximum} levels.`;
  if (text.length > LEVELS_TEXT_LENGTH) {
    return { ok: false, sentence: `The list has ${text.length} characters. ${holds} Shorten it.` };
  }
  const levels = text.split(/[\s,;]+/).filter((part) => part !== '');
  if (levels.length < minimum || levels.length > maximum) {
    const count = levels.length === 1 ? 'There is one level' : `There are ${levels.length} levels`;
    return { ok: false, sentence: `${count} in the list. ${holds} Enter that many, lowest first.` };
  }
  return { ok: true, levels };
}
