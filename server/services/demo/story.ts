import type { Claim, Decision } from '~/utils/contracts/production'
import type { FindingKind } from '~/utils/contracts/take'
import type { Key, PointKey } from '~/utils/motion/types'

/** How the demo's story is written down. Frames in threads and flags are frames of the newest take. */

export interface DemoRuling {
  decision: Decision
  by: string
  note: string
  daysAgo: number
}
export interface DemoTake {
  keys: Key[] | PointKey[]
  by: string
  daysAgo: number
  note?: string
  takenBack?: boolean
  /** Flags every finding of these kinds. */
  flags?: { kind: FindingKind; reason: string }[]
  waives?: { kind: FindingKind; reason: string }[]
  ruling?: DemoRuling
}
export interface DemoThread {
  take?: number
  frames?: [number, number]
  settled?: boolean
  says: [who: string, daysAgo: number, body: string][]
}
export interface DemoShot {
  code: string
  title: string
  brief: string
  fps?: number
  range: [number, number]
  dueIn?: number
  animator?: string
  supervisor?: string
  claim?: Claim
  takes?: DemoTake[]
  threads?: DemoThread[]
}
export interface DemoSequence {
  code: string
  title: string
  shots: DemoShot[]
}
