import { Chip, type Tone } from '@/components/ui/chip';

const PERSON_STATES: Readonly<Record<string, { word: string; tone: Tone }>> = {
  active: { word: 'Active', tone: 'moss' },
  invited: { word: 'Invited', tone: 'ochre' },
  disabled: { word: 'Disabled', tone: 'brick' },
};

const MAIL_STATE_WORDS: Readonly<Record<string, { word: string; tone: Tone }>> = {
  queued: { word: 'Waiting', tone: 'ochre' },
  sent: { word: 'Sent', tone: 'moss' },
  overtaken: { word: 'Overtaken', tone: 'soft' },
  dead: { word: 'Given up', tone: 'brick' },
};

function StateOf({ state, words }: { state: string; words: typeof PERSON_STATES }) {
  const { word, tone } = words[state] ?? { word: state, tone: 'soft' };
  return <Chip tone={tone}>{word}</Chip>;
}

/** The state of an account. */
export function PersonState({ state }: { state: string }) {
  return <StateOf state={state} words={PERSON_STATES} />;
}

/** The state of a mail of the outbox. */
export function MailStateChip({ state }: { state: string }) {
  return <StateOf state={state} words={MAIL_STATE_WORDS} />;
}

/** The word of a mail's state, as the list says it. */
export function mailStateWord(state: string): string {
  return MAIL_STATE_WORDS[state]?.word ?? state;
}
