/**
 * HTML built so that nothing from a file can become a tag: every value put into a `markup` template is
 * escaped, unless it is markup itself.
 */
export class Markup {
  readonly text: string;
  constructor(text: string) {
    this.text = text;
  }
}

type Part = string | number | Markup | undefined | readonly Part[];

/** Template tag: literal text is taken as it stands, values are escaped; lists are joined, undefined is nothing. */
export function markup(literals: TemplateStringsArray, ...parts: Part[]): Markup {
  return new Markup(literals.map((literal, index) => literal + (index < parts.length ? rendered(parts[index]) : '')).join(''));
}

function rendered(part: Part): string {
  if (part === undefined) return '';
  if (part instanceof Markup) return part.text;
  if (typeof part === 'string' || typeof part === 'number') return escaped(String(part));
  return part.map(rendered).join('');
}

/** Text for element content and quoted attributes. Control characters, which HTML forbids, become U+FFFD; line feed and tab stay. */
export function escaped(text: string): string {
  return text
    .replace(/[\u0000-\u0008\u000b-\u001f\u007f-\u009f]/g, '\ufffd')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

/** A name from a file: kept apart from the text's writing direction, so that it cannot reorder what stands beside it. */
export function named(text: string): Markup {
  return markup`<bdi>${text}</bdi>`;
}
