/** HTML that is safe by how it is built: every text put in is escaped, only `html` itself makes markup. */
export class SafeHtml {
  readonly text: string;
  constructor(text: string) {
    this.text = text;
  }
}

export type HtmlPart = string | number | null | false | undefined | SafeHtml | readonly SafeHtml[];

/** Markup with the given parts in it. Texts and numbers are escaped; null, undefined and false vanish. */
export function html(literals: TemplateStringsArray, ...parts: readonly HtmlPart[]): SafeHtml {
  let text = literals[0] ?? '';
  parts.forEach((part, i) => {
    text += markupOf(part) + (literals[i + 1] ?? '');
  });
  return new SafeHtml(text);
}

function markupOf(part: HtmlPart): string {
  if (part === null || part === undefined || part === false) return '';
  if (part instanceof SafeHtml) return part.text;
  if (typeof part === 'string' || typeof part === 'number') return escapeHtml(String(part));
  return part.map(({ text }) => text).join('');
}

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text as it may stand between tags and in quoted attributes, in HTML and in SVG. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (letter) => ENTITIES[letter] ?? letter);
}
