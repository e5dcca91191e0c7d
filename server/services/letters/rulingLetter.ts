import type { Decision } from '~/utils/contracts/production'
import { decisionWords } from '~/utils/drawing/words'
import { headerLine } from './headers'
import { Html, html, lines } from './html'
import { CELL, SMALL, heading, link, page } from './page'

export interface FlaggedFrames {
  fromFrame: number
  toFrame: number
  reason: string
  by: string
  /** What the judge says about these frames: whole sentences, perhaps none. */
  sentences: string[]
}
/** What a letter about a ruling tells. Addresses are built from it, so nothing in it is trusted. */
export interface RulingFacts {
  baseUrl: string
  production: { slug: string; title: string }
  shot: { code: string; title: string }
  take: number
  decision: Decision
  ruledBy: string
  /** ISO 8601, UTC. */
  at: string
  note: string
  /** Whose desk a take that goes back lands on. */
  animator: string | null
  flags: FlaggedFrames[]
  /** The judge's sentences that no flag speaks of and nobody waived. */
  findings: { frame: number | null; text: string }[]
  /** How many of each are left out, for the letter's sake: said, never hidden. */
  more: { flags: number; findings: number }
}
export interface Composed {
  subject: string
  text: string
  html: string
}

const STAMP_INK: Record<Decision, string> = {
  stands: 'light-dark(#2C6450,#7FC7A8)',
  'stands-with-notes': 'light-dark(#2C6450,#7FC7A8)',
  'goes-back': 'light-dark(#B02A1C,#FF8E7E)',
}

/** The address of the take on the shot's page, at a frame when one is named. */
export function takeLink(facts: Pick<RulingFacts, 'baseUrl' | 'production' | 'shot' | 'take'>, frame?: number): string {
  const place = `${facts.baseUrl}/p/${encodeURIComponent(facts.production.slug)}/shots/${encodeURIComponent(facts.shot.code)}`
  return `${place}?take=${facts.take}${frame === undefined ? '' : `&frame=${frame}`}`
}

const verdictOf = (facts: RulingFacts) => decisionWords[facts.decision].toLowerCase()
const framesOf = ({ fromFrame, toFrame }: FlaggedFrames) =>
  fromFrame === toFrame ? `Frame ${fromFrame}` : `Frames ${fromFrame}–${toFrame}`
/** "1 December 2026, 11:14 UTC": the same wherever it is read. */
function whenOf(at: string): string {
  const day = new Intl.DateTimeFormat('en-GB', { dateStyle: 'long', timeZone: 'UTC' }).format(new Date(at))
  return `${day}, ${at.slice(11, 16)} UTC`
}

const moreOf = (count: number, thing: string) => `And ${count} more ${thing}${count === 1 ? '' : 's'}, on the shot’s page.`

function whatNext({ decision, animator, shot, take }: RulingFacts): string {
  if (decision === 'stands') return `${shot.code} is settled. Nothing more is asked.`
  if (decision === 'stands-with-notes') return `${shot.code} is settled. The note and the flags go along into the work that follows.`
  const desk = animator ? `${animator}’s desk` : 'the animator’s desk'
  return `${shot.code} is on ${desk}. The next take can start from the ruled list of take ${take}.`
}

/** The letter that tells of a ruling, the same for everyone it goes to. */
export function rulingLetter(facts: RulingFacts): Composed {
  return {
    subject: headerLine(`${facts.shot.code} take ${facts.take} ${verdictOf(facts)}`),
    text: asText(facts),
    html: asHtml(facts),
  }
}

function asText(facts: RulingFacts): string {
  const parts = [
    `${facts.shot.code} “${facts.shot.title}”, ${facts.production.title}`,
    `Take ${facts.take} ${verdictOf(facts)}.\nRuled by ${facts.ruledBy}, ${whenOf(facts.at)}.`,
  ]
  if (facts.note) parts.push(`NOTE\n${facts.note.replace(/\r\n?/g, '\n')}`)
  if (facts.flags.length > 0) parts.push(`FLAGGED FRAMES\n${facts.flags.map((flag) => flagText(facts, flag)).join('\n\n')}`)
  if (facts.more.flags > 0) parts.push(moreOf(facts.more.flags, 'flag'))
  if (facts.findings.length > 0)
    parts.push(
      `WHAT ELSE THE JUDGE FOUND\n${facts.findings.map(({ frame, text }) => `- ${text}${frame === null ? '' : `\n  ${takeLink(facts, frame)}`}`).join('\n')}`,
    )
  if (facts.more.findings > 0) parts.push(moreOf(facts.more.findings, 'finding'))
  parts.push(`WHAT HAPPENS NEXT\n${whatNext(facts)}\n${takeLink(facts)}`)
  parts.push(`-- \nYou work on this shot, coordinate the production or took part in a thread.\nWhich letters you get: ${facts.baseUrl}/me`)
  return `${parts.join('\n\n')}\n`
}

function flagText(facts: RulingFacts, flag: FlaggedFrames): string {
  const said = [...flag.sentences.map((sentence) => `  Judge: ${sentence}`), `  ${flag.by}: ${flag.reason.replace(/\r\n?|\n/g, '\n  ')}`]
  return `${framesOf(flag)}\n${said.join('\n')}\n  ${takeLink(facts, flag.fromFrame)}`
}

function asHtml(facts: RulingFacts): string {
  const border = facts.decision === 'stands-with-notes' ? 'dashed' : 'solid'
  const stamp = new Html(
    `display:inline-block;padding:2px 12px;border:2px ${border} currentColor;border-radius:4px;font-weight:800;letter-spacing:0.06em;text-transform:uppercase;color:${STAMP_INK[facts.decision]}`,
  )
  return page({
    title: `${facts.shot.code} take ${facts.take} ${verdictOf(facts)}`,
    preview: `${facts.ruledBy}: ${facts.note || whatNext(facts)}`.slice(0, 140),
    body: html`<p style="margin:0;${new Html(SMALL)}">${facts.production.title}</p>
<h1 style="font-size:22px;line-height:1.25;margin:2px 0 12px">${link(takeLink(facts), `${facts.shot.code} take ${facts.take}`)} “${facts.shot.title}”</h1>
<p style="margin:0 0 12px"><span style="${stamp}">${decisionWords[facts.decision]}</span></p>
<p style="margin:0;${new Html(SMALL)}">Ruled by ${facts.ruledBy}, ${whenOf(facts.at)}</p>
${facts.note ? html`${heading('Note')}
<p style="margin:0">${lines(facts.note)}</p>` : ''}
${facts.flags.length > 0 ? flagTable(facts) : ''}
${facts.findings.length > 0 ? findingList(facts) : ''}
${heading('What happens next')}
<p style="margin:0">${whatNext(facts)} ${link(takeLink(facts), `Open ${facts.shot.code}`)}</p>`,
    foot: html`You work on this shot, coordinate the production or took part in a thread. ${link(`${facts.baseUrl}/me`, 'Choose which letters you get')}`,
  })
}

function flagTable(facts: RulingFacts): Html {
  const rows = facts.flags.map(
    (flag) => html`<tr style="page-break-inside:avoid">
<th scope="row" style="${new Html(CELL)};width:112px;font-variant-numeric:tabular-nums">${link(takeLink(facts, flag.fromFrame), framesOf(flag))}</th>
<td style="${new Html(CELL)}">${flag.sentences.map((sentence) => html`<div>${sentence}</div>`)}<div><b>${flag.by}:</b> ${lines(flag.reason)}</div></td>
</tr>
`,
  )
  return html`${heading('Flagged frames')}
<table style="border-collapse:collapse;width:100%">
<tbody>
${rows}</tbody>
</table>
${facts.more.flags > 0 ? html`<p>${moreOf(facts.more.flags, 'flag')}</p>` : ''}`
}

function findingList(facts: RulingFacts): Html {
  const items = facts.findings.map(
    ({ frame, text }) =>
      html`<li style="margin:0 0 6px">${text}${frame === null ? '' : html` ${link(takeLink(facts, frame), `Frame ${frame}`)}`}</li>
`,
  )
  return html`${heading('What else the judge found')}
<ul style="margin:0;padding-left:20px">
${items}</ul>
${facts.more.findings > 0 ? html`<p>${moreOf(facts.more.findings, 'finding')}</p>` : ''}`
}
