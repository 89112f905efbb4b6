import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { type Colour, PALETTE } from './palette';

const css = readFileSync(new URL('../app/globals.css', import.meta.url), 'utf8');
const darkPart = css.slice(css.indexOf('prefers-color-scheme: dark'));
const token = (part: string, colour: Colour): string | undefined =>
  new RegExp(`--color-${colour}: (#[0-9a-f]{6});`).exec(part)?.[1];

/** Relative luminance and contrast, WCAG 2.2 (W3C, 2023), glossary. */
function luminance(hex: string): number {
  const [red = 0, green = 0, blue = 0] = [1, 3, 5]
    .map((start) => parseInt(hex.slice(start, start + 2), 16) / 255)
    .map((value) => (value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4));
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}
function contrast(one: string, other: string): number {
  const [dark = 0, light = 0] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

/** Every text colour on every ground it stands on in a mail. */
const PAIRS: readonly (readonly [Colour, Colour])[] = [
  ['ink', 'paper'],
  ['ink', 'stone'],
  ['ink', 'ochre-wash'],
  ['ink-soft', 'paper'],
  ['ink-soft', 'stone'],
  ['water', 'paper'],
  ['paper', 'water'],
  ['ochre', 'ochre-wash'],
  ['brick', 'brick-wash'],
];

describe('the palette of mails', () => {
  it.each(Object.keys(PALETTE) as Colour[])('has %s as the pages have it', (colour) => {
    expect(PALETTE[colour]).toEqual({ light: token(css, colour), dark: token(darkPart, colour) });
  });

  it.each(PAIRS)('reads well: %s on %s', (text, ground) => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 10);
    for (const scheme of ['light', 'dark'] as const) {
      expect(contrast(PALETTE[text][scheme], PALETTE[ground][scheme])).toBeGreaterThanOrEqual(4.5);
    }
  });
});
