import type { SendMailOptions } from 'nodemailer'
import type { Letter } from '~/server/models'
import { domainOf, headerLine } from './headers'

interface Addressed {
  from: string
  to: { name: string; address: string }
  listId: string | null
  /** Public address: where a reader says which letters they want. */
  baseUrl: string
  text: string
  html: string
}

/** A stored letter as the mail library takes it. Every text that comes near a header is made one line first. */
export function messageOf(letter: Letter, { from, to, listId, baseUrl, text, html }: Addressed): SendMailOptions {
  const list: Record<string, string> = listId
    ? { 'List-ID': `<${headerLine(listId)}.${domainOf(from)}>`, 'List-Unsubscribe': `<${baseUrl}/me>` }
    : {}
  return {
    from,
    to: { name: headerLine(to.name), address: to.address },
    subject: headerLine(letter.subject),
    messageId: letter.messageId,
    ...(letter.threadMessageId ? { inReplyTo: letter.threadMessageId, references: letter.threadMessageId } : {}),
    // A queue keeps the date of writing, however late the letter gets through.
    date: new Date(letter.createdAt),
    headers: { 'Auto-Submitted': 'auto-generated', ...list },
    text,
    html,
    disableFileAccess: true,
    disableUrlAccess: true,
  }
}
