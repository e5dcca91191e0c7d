import { createHash, randomBytes } from 'node:crypto'

/** 256 random bits as base64url: 43 characters. */
export const newSecret = (): string => randomBytes(32).toString('base64url')
/** What is kept of a secret. It has 256 bits of its own, so a plain hash is enough. */
export const hashSecret = (secret: string): string => createHash('sha256').update(secret).digest('base64url')
