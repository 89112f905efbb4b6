import { type Colour, PALETTE } from '../palette';
import { Html, html } from './html';

const PROPERTIES = { c: 'color', bg: 'background-color', b: 'border-color' } as const;

/** What a colour is for: c the text, bg the ground, b the border. */
type Paint = Partial<Record<keyof typeof PROPERTIES, Colour>>;

/**
 * The class and style attributes of an element. The light colours stand in the element itself, for mail programs that
 * drop style sheets; the classes let the style sheet of `darkStyles` change them.
 * @param css more declarations, ended by semicolons
 * @param names more classes
 */
export function painted(paint: Paint, css = '', ...names: string[]): Html {
  const entries = (Object.entries(paint) as [keyof typeof PROPERTIES, Colour][]).map(([use, colour]) => ({
    name: `${use}-${colour}`,
    declaration: `${PROPERTIES[use]}:${PALETTE[colour].light};`,
  }));
  const classes = [...names, ...entries.map(({ name }) => name)].join(' ');
  const style = css + entries.map(({ declaration }) => declaration).join('');
  return html`class="${classes}" style="${style}"`;
}

/** The style sheet that turns every colour dark for readers whose device is set so. */
export function darkStyles(): Html {
  const rules = (Object.keys(PALETTE) as Colour[]).flatMap((colour) =>
    Object.entries(PROPERTIES).map(
      ([use, property]) => `.${use}-${colour}{${property}:${PALETTE[colour].dark} !important}`,
    ),
  );
  return new Html(`@media (prefers-color-scheme: dark){${rules.join('')}}`);
}
