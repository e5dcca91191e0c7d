/** HTML that can only be put together from escaped text: whatever is filled into the template is text, unless `html` itself made it. */
export class Html {
  constructor(readonly source: string) {}
}

type Filling = string | number | Html | readonly Html[]

const ENTITIES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }
const CONTROL = /(?![\n\t])\p{Cc}/gu

/** Text as it may stand between tags and inside quoted attributes. */
export function escapeText(text: string): string {
  return text.replace(CONTROL, '').replace(/[&<>"']/g, (character) => ENTITIES[character] ?? '')
}

export function html(parts: TemplateStringsArray, ...fillings: Filling[]): Html {
  return new Html(parts.map((part, i) => part + (i < fillings.length ? sourceOf(fillings[i]!) : '')).join(''))
}

function sourceOf(filling: Filling): string {
  if (filling instanceof Html) return filling.source
  if (Array.isArray(filling)) return filling.map((one: Html) => one.source).join('')
  return escapeText(String(filling))
}

/** Several lines of plain text; their breaks are kept. */
export function lines(text: string): Html {
  return new Html(escapeText(text.replace(/\r\n?/g, '\n')).replaceAll('\n', '<br>\n'))
}
