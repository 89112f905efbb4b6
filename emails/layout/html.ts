/** A piece of HTML that is safe to put into a page as it stands. */
export class Html {
  constructor(readonly source: string) {}
}

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text as HTML shows it unchanged, between tags and in quoted attributes. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => ENTITIES[character] ?? character);
}

type Value = string | number | Html | readonly Html[];

function sourceOf(value: Value): string {
  if (value instanceof Html) return value.source;
  if (typeof value === 'object') return value.map((each) => each.source).join('');
  return escapeHtml(String(value));
}

/**
 * A template of HTML: every value put into it is escaped unless it is `Html` itself. Values stand between tags or in
 * quoted attributes, never in a style sheet, a script or an unquoted attribute.
 */
export function html(strings: TemplateStringsArray, ...values: Value[]): Html {
  return new Html(
    strings.reduce((made, piece, index) => {
      const value = values[index];
      return made + piece + (value === undefined ? '' : sourceOf(value));
    }, ''),
  );
}
