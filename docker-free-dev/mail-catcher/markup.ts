/** A piece of HTML that is safe to put into a page as it is. */
export class Markup {
  readonly text: string;

  constructor(text: string) {
    this.text = text;
  }
}

const REFERENCES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };

const escaped = (text: string): string => text.replace(/[&<>"']/g, (character) => REFERENCES[character] ?? character);

function written(value: unknown): string {
  if (value instanceof Markup) return value.text;
  if (Array.isArray(value)) return value.map(written).join('');
  return escaped(String(value ?? ''));
}

/** Template tag that escapes every value but other pieces of markup. */
export function html(parts: TemplateStringsArray, ...values: unknown[]): Markup {
  return new Markup(parts.reduce((text, part, index) => text + written(values[index - 1]) + part));
}

/** Text with its web addresses as links. */
export function withLinks(text: string): Markup {
  const pieces = text.split(/(https?:\/\/[^\s<>"')\]]*[^\s<>"')\].,;:!?])/g);
  return new Markup(pieces.map((piece, index) => written(index % 2 ? link(piece) : piece)).join(''));
}

const link = (address: string): Markup => html`<a href="${address}" target="_blank" rel="noopener noreferrer">${address}</a>`;
