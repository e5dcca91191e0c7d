/** What may stand in a mail header, and the names that letters go by. */

// Control characters (a line break starts the next header), line and paragraph separators, and marks that turn the reading direction.
const NEVER_IN_A_HEADER = /[\p{Cc}\u061C\u200E\u200F\u2028-\u202E\u2066-\u2069]+/gu
const ADDRESS = /^[^\s<>,;:"()[\]\\@\p{Cc}]+@[^\s<>,;:"()[\]\\@\p{Cc}]+$/u

/** One line, whatever somebody wrote: security.md 1.3.11. */
export function headerLine(text: string): string {
  return text.replace(NEVER_IN_A_HEADER, ' ').replace(/ {2,}/g, ' ').trim()
}

/** True for one plain address that cannot be mistaken for several, or for more of the header. */
export function isPlainAddress(address: string): boolean {
  return address.length <= 254 && ADDRESS.test(address)
}

/** The domain of `Name <box@domain>`; the reserved one when none can be read. */
export function domainOf(from: string): string {
  return /@([a-z0-9.-]+)>?\s*$/i.exec(from)?.[1]?.toLowerCase() ?? 'tiltyard.invalid'
}

/** Made once with the letter and kept: a second delivery after a crash carries the same, and receivers can tell. */
export const messageIdOf = (letterId: string, from: string): string => `<letter.${letterId}@${domainOf(from)}>`
/** What every letter about one shot answers to, so that mail programs show them together. */
export const shotThreadId = (shotId: string, from: string): string => `<shot.${shotId}@${domainOf(from)}>`
