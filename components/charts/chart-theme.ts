'use client';

import { useMemo, useSyncExternalStore } from 'react';
import type { ChartTone } from './chart-spec';

/** The look's tokens as the browser has them now. */
export interface ChartTokens extends Record<ChartTone, string> {
  paper: string;
  stone: string;
  line: string;
  'water-wash': string;
  fontFamily: string;
}

const names = [
  'paper',
  'stone',
  'line',
  'ink',
  'ink-soft',
  'water',
  'water-deep',
  'water-wash',
  'ochre',
  'brick',
  'moss',
] as const;

/** Reads the tokens from the page's style. */
export function readChartTokens(root: HTMLElement = document.documentElement): ChartTokens {
  const style = getComputedStyle(root);
  const colours = Object.fromEntries(
    names.map((name) => [name, style.getPropertyValue(`--color-${name}`).trim()]),
  ) as Record<(typeof names)[number], string>;
  return { ...colours, fontFamily: style.getPropertyValue('--font-sans').trim() };
}

function subscribe(changed: () => void): () => void {
  const media = ['(prefers-color-scheme: dark)', 'print'].map((query) => matchMedia(query));
  for (const query of media) query.addEventListener('change', changed);
  const observer = new MutationObserver(changed);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme'] });
  return () => {
    for (const query of media) query.removeEventListener('change', changed);
    observer.disconnect();
  };
}

/** The tokens, read again when the theme changes or the page is printed. */
export function useChartTokens(): ChartTokens {
  const read = useSyncExternalStore(
    subscribe,
    () => JSON.stringify(readChartTokens()),
    () => '{}',
  );
  return useMemo(() => JSON.parse(read) as ChartTokens, [read]);
}
