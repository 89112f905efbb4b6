/** The longest line of a text mail. A web address that is longer stands on a line of its own, unbroken. */
export const LINE_LENGTH = 72;

const isAddress = (word: string): boolean => /^https?:\/\//.test(word);

/** A word's pieces of at most `length` characters; an address stays whole. */
function pieces(word: string, length: number): string[] {
  const characters = [...word];
  if (characters.length <= length || isAddress(word)) return [word];
  const made: string[] = [];
  for (let start = 0; start < characters.length; start += length) {
    made.push(characters.slice(start, start + length).join(''));
  }
  return made;
}

/**
 * Breaks a text into lines of at most `LINE_LENGTH` characters at its blanks. Non-breaking spaces hold words together
 * and become blanks after that.
 * @param text the text; other white space in it counts as one blank
 * @param first put before the first line
 * @param rest put before the other lines
 */
export function wrap(text: string, first = '', rest = ' '.repeat([...first].length)): string {
  const room = LINE_LENGTH - [...first].length;
  const words = text.split(/[^\S\u00a0]+/).filter((word) => word !== '');
  const lines: string[] = [];
  let line = '';
  for (const word of words.flatMap((each) => pieces(each, room))) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (line !== '' && [...longer].length > room) {
      lines.push(line);
      line = word;
    } else {
      line = longer;
    }
  }
  lines.push(line);
  return lines
    .map((each, index) => (index === 0 ? first : rest) + each.replaceAll('\u00a0', ' '))
    .join('\n')
    .trimEnd();
}
