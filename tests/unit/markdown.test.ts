// @vitest-environment jsdom
import { describe, expect, it } from 'vitest'
import { cleanMarkdown } from '~/utils/markdown'

/** What is left after insertion: elements, and whatever could run or call home. */
function inserted(source: string): HTMLElement {
  const holder = document.createElement('div')
  holder.innerHTML = cleanMarkdown(source)
  return holder
}
const ALLOWED = ['A', 'BLOCKQUOTE', 'BR', 'CODE', 'EM', 'LI', 'OL', 'P', 'PRE', 'STRONG', 'UL']

describe('cleanMarkdown: ASVS 1.3.1, 1.3.5', () => {
  it.each([
    '<script>alert(1)</script>',
    '<img src=x onerror=alert(1)>',
    '<svg onload=alert(1)><a xlink:href="javascript:alert(1)">x</a></svg>',
    '<math><mtext><table><mglyph><style><!--</style><img title="--&gt;&lt;img src=1 onerror=alert(1)&gt;">',
    '[x](javascript:alert(1))',
    '[x](JaVaScRiPt&colon;alert(1))',
    '[x](\u0001javascript:alert(1))',
    '[x](data:text/html;base64,PHNjcmlwdD5hbGVydCgxKTwvc2NyaXB0Pg==)',
    '[x](vbscript:msgbox(1))',
    '[x](//elsewhere.example/track)',
    '![x](https://elsewhere.example/track.png)',
    '![x"onerror="alert(1)](x)',
    '<a href="https://ok.example" onclick="alert(1)" style="position:fixed">x</a>',
    '<iframe srcdoc="<script>alert(1)</script>"></iframe>',
    '<form action="https://elsewhere.example"><button>Sign in</button></form>',
    '<div id="__nuxt" class="fixed">x</div>',
    '`<script>alert(1)</script>`',
    '```html\n<img src=x onerror=alert(1)>\n```',
    '# <img src=x onerror=alert(1)>',
    '| a | b |\n|---|---|\n| <img src=x onerror=alert(1)> | c |',
  ])('leaves nothing that runs or calls home in %j', (source) => {
    const holder = inserted(source)
    for (const element of holder.querySelectorAll('*')) {
      expect(ALLOWED).toContain(element.tagName)
      for (const { name, value } of element.attributes) {
        expect(['href', 'rel', 'target']).toContain(name)
        if (name === 'href') expect(value).toMatch(/^(?:https?:\/\/|mailto:)/)
      }
    }
  })
  it('keeps the words that it takes the power from', () => {
    expect(inserted('<b>61</b> sits early').textContent).toContain('<b>61</b> sits early')
    expect(inserted('![the chart](https://elsewhere.example/x.png)').textContent).toContain('the chart')
  })
  it('keeps what a margin note needs', () => {
    const holder = inserted('Frame **61**, _see_ [chart](https://quayside.example)\nline two\n\n- one\n- two\n\n> quoted')
    expect([...holder.querySelectorAll('*')].map(({ tagName }) => tagName)).toEqual([
      'P', 'STRONG', 'EM', 'A', 'BR', 'UL', 'LI', 'LI', 'BLOCKQUOTE', 'P',
    ])
    expect(holder.querySelector('a')?.rel).toBe('noopener noreferrer nofollow')
  })
  it('has no headings', () => {
    expect(inserted('# Loud').innerHTML.trim()).toBe('<p><strong>Loud</strong></p>')
  })
})
