import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto'

/**
 * A one-use link waits in the outbox until it is sent. It is as good as a password, so it never lies there in clear:
 * AES-256-GCM under a key derived from the session secret, bound to its letter.
 */
const CIPHER = 'aes-256-gcm'
const IV_BYTES = 12
const TAG_BYTES = 16

function keyOf(secret: string): Buffer {
  if (secret.length < 32) throw new Error('The session secret is missing or too short to seal a link with.')
  return Buffer.from(hkdfSync('sha256', secret, '', 'tiltyard: one-use link in the outbox', 32))
}

/** @returns base64url of iv, tag and sealed text. */
export function sealLink(url: string, letterId: string, secret: string): string {
  const iv = randomBytes(IV_BYTES)
  const cipher = createCipheriv(CIPHER, keyOf(secret), iv).setAAD(Buffer.from(letterId))
  const sealed = Buffer.concat([cipher.update(url, 'utf8'), cipher.final()])
  return Buffer.concat([iv, cipher.getAuthTag(), sealed]).toString('base64url')
}

/** @returns the link, or null when it was sealed with another secret, for another letter, or was changed since. */
export function openLink(sealed: string, letterId: string, secret: string): string | null {
  const bytes = Buffer.from(sealed, 'base64url')
  if (bytes.length <= IV_BYTES + TAG_BYTES) return null
  try {
    const decipher = createDecipheriv(CIPHER, keyOf(secret), bytes.subarray(0, IV_BYTES), { authTagLength: TAG_BYTES })
      .setAAD(Buffer.from(letterId))
      .setAuthTag(bytes.subarray(IV_BYTES, IV_BYTES + TAG_BYTES))
    return Buffer.concat([decipher.update(bytes.subarray(IV_BYTES + TAG_BYTES)), decipher.final()]).toString('utf8')
  } catch {
    return null
  }
}
