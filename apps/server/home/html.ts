/** Text that is HTML already. */
export class Html {
  constructor(readonly text: string) {}
}

type Part = string | number | Html | null | readonly Part[];

const ESCAPES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' };

/** HTML from a template whose values are escaped, unless they are HTML themselves. */
export function html(strings: TemplateStringsArray, ...parts: Part[]): Html {
  return new Html(strings.map((text, i) => (i === 0 ? '' : written(parts[i - 1] ?? null)) + text).join(''));
}

function written(part: Part): string {
  if (part === null) return '';
  if (part instanceof Html) return part.text;
  if (typeof part === 'object') return part.map(written).join('');
  return String(part).replace(/[&<>"']/g, (sign) => ESCAPES[sign] ?? '');
}
