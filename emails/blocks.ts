import type { Block, Fact } from './message';

/** A paragraph; its texts are joined by blanks. */
export function paragraph(...sentences: string[]): Block {
  return { type: 'paragraph', text: sentences.join(' ') };
}

/** A list of labelled values, in order. */
export function facts(values: Readonly<Record<string, string>>): Block {
  return { type: 'facts', facts: Object.entries(values).map(([label, value]): Fact => ({ label, value })) };
}

/** The one thing to do. `path` is below the installation's address; codes and tokens need no encoding. */
export function action(label: string, path: string): Block {
  return { type: 'action', label, path };
}

export const caution: Block = { type: 'caution' };
