/**
 * Which passwords are refused: the commonest ones, and nothing else. No rule about capitals, digits or signs, and the
 * password is never changed on its way (security.md 6.2.4, 6.2.5, 6.2.8). Lengths are in utils/contracts/common.ts.
 */
import { LIMITS } from '~/utils/contracts/common'

const COMMON = 'This is one of the commonest passwords: choose another.'
const OWN_ADDRESS = 'This is your own address: choose something that others don’t know.'
const MONOTONE = 'This repeats one small piece: choose something longer to guess.'

let commonest: Promise<ReadonlySet<string>> | null = null

/** About 49,000 passwords, unpacked when the first one is chosen: most days nobody chooses one. */
function commonPasswords(): Promise<ReadonlySet<string>> {
  commonest ??= import('@zxcvbn-ts/language-common').then(
    ({ dictionary }) => new Set(dictionary['passwords-common'].map((word) => String(word).toLowerCase())),
  )
  return commonest
}

/** @returns why this password may not be chosen, as a sentence; null when it may. */
export async function refusedPassword(password: string, email: string): Promise<string | null> {
  const typed = password.toLowerCase()
  if (typed === email.toLowerCase() || typed === email.toLowerCase().split('@')[0]) return OWN_ADDRESS
  const unit = repeatedPiece(typed)
  if (unit.length <= 3) return MONOTONE
  const common = await commonPasswords()
  // Of the list's words only those of ten characters and more could be chosen as they stand, so the usual ways of
  // stretching a shorter one are looked through: a few digits or signs at its end, or the word said twice.
  const stems = [typed, unit, withoutTail(typed), repeatedPiece(withoutTail(typed))]
  return stems.some((stem) => common.has(stem) || stem === 'tiltyard') ? COMMON : null
}

/** At most four digits or signs that somebody hung on a word: `password1234` → `password`. */
function withoutTail(text: string): string {
  const stem = text.replace(/[\d!?.,;:*#$@_-]{1,4}$/, '')
  return stem.length >= 4 && stem.length < LIMITS.passwordMaxChars ? stem : text
}

/** The shortest piece that the whole text repeats; the text itself when it repeats none. */
function repeatedPiece(text: string): string {
  // A text that is a repetition is found inside its own double before its own end.
  const at = (text + text).indexOf(text, 1)
  return at > 0 && at < text.length ? text.slice(0, at) : text
}
