/** Constant turning: even spacing of an angle, however many times round. Readings that begin again at a full turn are joined first (turns.ts). */
import type { LawModel } from './model'
import { steady } from './steady'

export const spin: LawModel = { ...steady, law: 'spin' }
