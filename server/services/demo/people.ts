import type { Role } from '~/utils/permissions'

/** The demo's invented people. Those with a role of that name sign in; the others only work there. */
export const DEMO_PASSWORD = 'cranes walk at night'

export interface DemoPerson {
  key: string
  email: string
  name: string
  /** Null: a keeper of the installation without a place in the production. */
  role: Role | null
  signsIn: boolean
}

const at = (local: string) => `${local}@quayside.example`

export const demoPeople: DemoPerson[] = [
  { key: 'animator', email: at('animator'), name: 'Mirel Isbrand', role: 'animator', signsIn: true },
  { key: 'supervisor', email: at('supervisor'), name: 'Odile Drömm', role: 'supervisor', signsIn: true },
  { key: 'coordinator', email: at('coordinator'), name: 'Tamsin Eyrol', role: 'coordinator', signsIn: true },
  { key: 'guest', email: at('guest'), name: 'Corvin Vale-Hart', role: 'guest', signsIn: true },
  { key: 'keeper', email: at('keeper'), name: 'Brannoch Keel', role: null, signsIn: true },
  { key: 'nagisa', email: at('nagisa'), name: '汐見 なぎ', role: 'animator', signsIn: false },
  { key: 'pell', email: at('pell'), name: 'Pell Achterberg', role: 'animator', signsIn: false },
  { key: 'suvi', email: at('suvi'), name: 'Suvi Rannekko', role: 'animator', signsIn: false },
  { key: 'lotte', email: at('lotte'), name: 'Lotte Umbrasen', role: 'supervisor', signsIn: false },
]
