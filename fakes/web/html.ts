/** Text that is markup already and is put into a page as it stands. */
export class Markup {
  constructor(private readonly text: string) {}

  toString(): string {
    return this.text;
  }
}

type Part = Markup | string | number | null | undefined | false | readonly Part[];

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (character) => ENTITIES[character] ?? character);
}

/** Template tag that escapes every value except markup made by itself; empty values leave no trace. */
export function html(strings: TemplateStringsArray, ...parts: Part[]): Markup {
  return new Markup(strings.reduce((text, piece, index) => text + render(parts[index - 1]) + piece));
}

function render(part: Part): string {
  if (part === null || part === undefined || part === false) return '';
  if (part instanceof Markup) return part.toString();
  if (typeof part === 'string' || typeof part === 'number') return escapeHtml(String(part));
  return part.map(render).join('');
}
