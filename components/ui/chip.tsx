import type { ReactNode } from 'react';

/** What a chip's colour stands for; the word always says it too. */
export type Tone = 'moss' | 'ochre' | 'brick' | 'water' | 'soft';

const toneClass: Record<Tone, string> = {
  moss: 'text-moss',
  ochre: 'text-ochre',
  brick: 'text-brick',
  water: 'text-water',
  soft: 'text-ink-soft',
};

/** A word in a thin frame. */
export function Chip({ tone = 'soft', children }: { tone?: Tone; children: ReactNode }) {
  return (
    <span
      className={`inline-block rounded-sm border border-current px-1.75 py-px text-[0.78125rem] leading-normal font-semibold tracking-[0.02em] whitespace-nowrap ${toneClass[tone]}`}
    >
      {children}
    </span>
  );
}

const stateTones: Record<string, Tone> = {
  open: 'moss',
  active: 'moss',
  signed: 'moss',
  released: 'moss',
  approved: 'moss',
  'in-review': 'ochre',
  'under-review': 'ochre',
  'awaiting-sign-off': 'ochre',
  computed: 'ochre',
  returned: 'ochre',
  waiting: 'ochre',
  halted: 'brick',
  suspended: 'brick',
  overtaken: 'brick',
  overdue: 'brick',
  stopped: 'brick',
};

/** The tone of a state of a trial, cohort, recommendation or site; unknown and finished states are soft. */
export function toneOfState(state: string): Tone {
  return stateTones[state.replaceAll(/[\s_]+/g, '-').toLowerCase()] ?? 'soft';
}

/** The word of a state as it is shown: "in-review" and "in_review" read "In review". */
export function wordOfState(state: string): string {
  const words = state.replaceAll(/[-_]+/g, ' ').replace('sign off', 'sign-off');
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** The state of a trial, cohort, recommendation or site as a chip. */
export function StateChip({ state, word }: { state: string; word?: string }) {
  return <Chip tone={toneOfState(state)}>{word ?? wordOfState(state)}</Chip>;
}
