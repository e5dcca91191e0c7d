import { defineStore } from 'pinia'
import { computed, shallowRef } from 'vue'
import type { Sheet, Wall } from '~/utils/contracts/production'
import { passes, tally } from '~/utils/wall'
import type { Tally, Viewer, WallFilter } from '~/utils/wall'

/** How many sheets the server paints: more than a screenful. The rest follow once the page is alive, so that its payload stays under 100 kB. */
export const FIRST_SHEETS = 16

/** A wall as the first paint carries it: the first sheets that pass the filter, and figures about all of them. */
export interface FirstWall extends Omit<Wall, 'sheets'> {
  sheets: Sheet[]
  total: number
  passing: number
  tally: Tally
}

export function firstWall(wall: Wall, filter: WallFilter, viewer: Viewer, today: string): FirstWall {
  const passing = wall.sheets.filter((sheet) => passes(sheet, filter, viewer, today))
  const all = wall.sheets.length <= FIRST_SHEETS
  return {
    ...wall,
    sheets: all ? wall.sheets : passing.slice(0, FIRST_SHEETS),
    total: wall.sheets.length,
    passing: passing.length,
    tally: tally(wall.sheets, wall.sequences, viewer, today),
  }
}

/**
 * The wall on screen. The refs are private on purpose: Pinia would write every public one into the page a second time,
 * beside what useAsyncData already carries.
 */
export const useWallStore = defineStore('wall', () => {
  const first = shallowRef<FirstWall | null>(null)
  const whole = shallowRef<Wall | null>(null)

  /**
   * Takes what the first paint brought; it is whole already when no sheet was left out. A wall that was whole before stays on
   * screen until `complete` has fetched it again: on the way back from a shot the page keeps its height, and so its place.
   */
  function accept(brought: FirstWall): void {
    first.value = brought
    if (brought.sheets.length === brought.total) whole.value = brought
    else if (whole.value?.production.slug !== brought.production.slug) whole.value = null
  }

  /** Fetches every sheet. */
  async function complete(): Promise<void> {
    const slug = first.value?.production.slug
    if (!slug) return
    const wall = await $fetch<Wall>(`/api/productions/${slug}/wall`)
    if (first.value?.production.slug === slug) whole.value = wall
  }

  /** Fetches one sheet again, in its place; a shot that is new comes in story order with the whole wall. */
  async function refresh(code: string): Promise<void> {
    const slug = first.value?.production.slug
    if (!slug) return
    if (!whole.value?.sheets.some((sheet) => sheet.code === code)) return complete()
    const fresh = await $fetch<Sheet>(`/api/productions/${slug}/wall/${code}`)
    const known = whole.value
    if (known?.production.slug !== slug) return
    const before = known.sheets.find((sheet) => sheet.code === code)
    if (before && (before.position !== fresh.position || before.sequence !== fresh.sequence)) return complete()
    whole.value = { ...known, sheets: known.sheets.map((sheet) => (sheet.code === code ? fresh : sheet)) }
  }

  return {
    accept,
    complete,
    refresh,
    first: computed(() => first.value),
    whole: computed(() => whole.value),
  }
})
