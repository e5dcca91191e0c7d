import { escapeText, html } from './html'
import { heading, link, page } from './page'
import type { Composed } from './rulingLetter'

/** Stands where the one-use link comes: the stored letter never holds the link itself. */
const PLACE = '[[one-use link]]'
const SHOWN = '(one-use link, shown only to its reader)'

interface LinkFacts {
  kind: 'invitation' | 'reset'
  toName: string
  /** Public address of this installation. */
  baseUrl: string
}

/** An invitation or a forgotten password, with a place for the link. */
export function linkLetter({ kind, toName, baseUrl }: LinkFacts): Composed {
  const invited = kind === 'invitation'
  const subject = invited ? 'Your invitation to Tiltyard' : 'A new password for Tiltyard'
  const opening = invited
    ? 'You are invited to the board where your team posts its spacing lists, has them judged and rules on them.'
    : 'Somebody, we hope you, asked for a new password for your account.'
  const action = invited ? 'Open this link to choose a password:' : 'Open this link to choose a new password:'
  const caution = invited
    ? 'The link works once and for a limited time. It is for you alone: do not pass it on.'
    : 'The link works once and for a limited time. If you did not ask, leave it alone: your password stays as it is.'
  return {
    subject,
    text: `Dear ${toName},\n\n${opening}\n\n${action}\n${PLACE}\n\n${caution}\n\n-- \nTiltyard, ${baseUrl}\n`,
    html: page({
      title: subject,
      preview: opening,
      body: html`${heading(subject)}
<p style="margin:0 0 12px">Dear ${toName},</p>
<p style="margin:0 0 12px">${opening}</p>
<p style="margin:0 0 12px">${action}<br>
${link(PLACE, PLACE)}</p>
<p style="margin:0">${caution}</p>`,
      foot: html`Tiltyard, ${link(baseUrl, baseUrl)}`,
    }),
  }
}

interface Body {
  text: string
  html: string
}

/** The letter as its reader gets it. */
export function fillLink(body: Body, url: string): Body {
  // A function as replacement: `$&` in an address means nothing special.
  return { text: body.text.replaceAll(PLACE, () => url), html: body.html.replaceAll(PLACE, () => escapeText(url)) }
}

/** The letter as anyone else may see it. */
export function hideLink(body: Body): Body {
  return {
    text: body.text.replaceAll(PLACE, SHOWN),
    html: body.html.replaceAll(`href="${PLACE}"`, '').replaceAll(PLACE, SHOWN),
  }
}
