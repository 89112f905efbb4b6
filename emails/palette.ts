/**
 * The look's colours as a mail needs them: written into each element, since mail programs know no custom properties.
 * A test compares them with the tokens of app/globals.css.
 */
export const PALETTE = {
  paper: { light: '#fbf8f2', dark: '#14191d' },
  stone: { light: '#f1eadd', dark: '#1c2328' },
  line: { light: '#dcd2c0', dark: '#36424a' },
  ink: { light: '#1f2b36', dark: '#ece6da' },
  'ink-soft': { light: '#55616b', dark: '#a9b3b8' },
  water: { light: '#0e6a73', dark: '#6cc3c6' },
  ochre: { light: '#8a5a00', dark: '#e7b75a' },
  'ochre-wash': { light: '#f7e8c8', dark: '#3a2e14' },
  brick: { light: '#97301f', dark: '#f0917e' },
  'brick-wash': { light: '#f6ddd7', dark: '#40211b' },
} as const;

export type Colour = keyof typeof PALETTE;

/** The typefaces: a mail fetches none, so these are the ones the look falls back to. */
export const TYPEFACES = {
  sans: "'Helvetica Neue', Arial, sans-serif",
  serif: "Georgia, 'Times New Roman', serif",
  mono: "'DejaVu Sans Mono', Menlo, Consolas, monospace",
} as const;
