import DOMPurify from 'dompurify'
import { Marked } from 'marked'

/** The tags that words may carry: look.md has room for nothing else in a margin. */
const TAGS = ['p', 'br', 'em', 'strong', 'code', 'pre', 'ul', 'ol', 'li', 'blockquote', 'a']
const LINK = /^(?:https?:\/\/|mailto:)/i

const escapeHtml = (text: string) =>
  text.replace(/[&<>"']/g, (mark) => ({ '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' })[mark]!)

const marked = new Marked({
  gfm: true,
  breaks: true,
  async: false,
  tokenizer: {
    // Returning nothing switches a construct off: its characters stay what they are.
    table: () => undefined,
    del: () => undefined,
  },
  renderer: {
    html: ({ text }) => escapeHtml(text),
    hr: () => '<p>—</p>',
    checkbox: ({ checked }) => (checked ? '☑ ' : '☐ '),
    // A picture is somebody else's server asking who reads this: its words stay, the picture doesn't load.
    image: ({ text }) => escapeHtml(text),
    heading({ tokens }) {
      return `<p><strong>${this.parser.parseInline(tokens)}</strong></p>`
    },
  },
})

let purify: typeof DOMPurify | undefined

function purifier(): typeof DOMPurify {
  if (purify) return purify
  // An instance of its own, so that its hook can't touch, or be touched by, anything else.
  purify = DOMPurify(window)
  purify.addHook('afterSanitizeAttributes', (node) => {
    if (node.tagName !== 'A') return
    node.setAttribute('rel', 'noopener noreferrer nofollow')
    node.setAttribute('target', '_blank')
  })
  return purify
}

/**
 * Markdown source to HTML that may be inserted. Needs a document, so it runs in the browser only; call it right before
 * insertion and keep the source, never the result.
 */
export function cleanMarkdown(source: string): string {
  const dirty = marked.parse(source, { async: false })
  return purifier().sanitize(dirty, {
    ALLOWED_TAGS: TAGS,
    ALLOWED_ATTR: ['href'],
    ALLOWED_URI_REGEXP: LINK,
    ALLOW_DATA_ATTR: false,
    ALLOW_ARIA_ATTR: false,
    KEEP_CONTENT: true,
  })
}
