/**
 * Spacing lists with their truth, by the dozen: which families are made, and how many of each. Shares no code with the judge.
 */
import { attempt } from './attempt'
import type { Family, Law, MadeList } from './made'
import { Chance } from './random'

export type { MadeList, TruthOf } from './made'

/** Families with the law that is claimed, in the order in which they are made. */
export type Plan = readonly (readonly [Family, Law])[]

const PLAN: Plan = [
  ['clean', 'topple'], ['clean', 'topple'], ['clean', 'pendulum'], ['clean', 'pendulum'], ['clean', 'odd-rule'], ['clean', 'odd-rule'], ['clean', 'steady'],
  ['misplaced', 'topple'], ['misplaced', 'pendulum'], ['misplaced', 'odd-rule'], ['misplaced', 'steady'],
  ['misplaced-two', 'topple'], ['misplaced-two', 'pendulum'], ['misplaced-two', 'odd-rule'],
  ['held', 'topple'], ['held', 'pendulum'], ['held', 'odd-rule'], ['held', 'steady'],
  ['skipped', 'topple'], ['skipped', 'pendulum'], ['skipped', 'odd-rule'], ['skipped', 'steady'],
  ['wrong-scale', 'topple'], ['wrong-scale', 'pendulum'], ['wrong-scale', 'odd-rule'],
  ['backward', 'topple'], ['backward', 'odd-rule'],
  ['even', 'odd-rule'], ['even', 'topple'], ['even', 'pendulum'],
  ['ease', 'odd-rule'], ['ease', 'topple'], ['ease', 'pendulum'],
  ['fall-as-topple', 'topple'], ['topple-as-fall', 'odd-rule'],
  ['short', 'topple'], ['short', 'odd-rule'], ['few', 'topple'], ['few', 'odd-rule'], ['few', 'steady'],
]

/** What is hard to tell: next to no drawings, many bad ones among few, pencil that only just stays inside the slop. */
export const HARD: Plan = [
  ['rough', 'topple'], ['rough', 'pendulum'], ['rough', 'odd-rule'], ['rough', 'steady'],
  ['misplaced-brief', 'topple'], ['misplaced-brief', 'pendulum'], ['misplaced-brief', 'odd-rule'], ['misplaced-brief', 'steady'],
  ['held-brief', 'topple'], ['held-brief', 'pendulum'], ['held-brief', 'odd-rule'], ['held-brief', 'steady'],
  ['skipped-brief', 'topple'], ['skipped-brief', 'pendulum'], ['skipped-brief', 'odd-rule'], ['skipped-brief', 'steady'],
  ['ease-brief', 'odd-rule'], ['ease-brief', 'topple'], ['ease-brief', 'pendulum'],
  ['misplaced-many', 'topple'], ['misplaced-many', 'pendulum'], ['misplaced-many', 'odd-rule'], ['misplaced-many', 'steady'],
]

/** Clean lists with a size to read. */
export const SIZED: Plan = [['clean', 'topple'], ['clean', 'pendulum']]

/** `count` lists, every family of the plan in turn, from one seed. */
export function makeLists(count: number, seed: number, plan = PLAN): MadeList[] {
  const lists: MadeList[] = []
  for (let i = 0; lists.length < count; i++) {
    const [family, law] = plan[lists.length % plan.length] as Plan[number]
    const made = attempt(new Chance(seed * 1_000_003 + i), family, law)
    if (made) lists.push(made)
  }
  return lists
}
