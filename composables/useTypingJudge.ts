import type { Claim } from '~/utils/contracts/production'
import { CHECK_LIMITS } from '~/utils/contracts/check'
import { judge } from '~/utils/motion'
import type { CheckResult, Key, PointKey } from '~/utils/motion/types'
import { typedRequest } from '~/utils/posting/typed'

/** A list this quick to judge is judged on every frame; a slower one waits for a pause in the typing. */
const QUICK_MS = 12

/**
 * The judge's answer to a list that is being typed: here in the browser, on the next frame, no round trip. Null while there
 * are too few keys to ask about, or a joint of the claim has no drawing.
 */
export function useTypingJudge(keys: () => readonly Key[] | readonly PointKey[], claim: () => Claim, fps: () => number) {
  const answer = shallowRef<CheckResult | null>(null)
  const tookMs = ref(0)
  let waiting = 0
  let pause: ReturnType<typeof setTimeout> | null = null

  function run() {
    const list = keys()
    if (list.length < CHECK_LIMITS.minKeys || list.length > CHECK_LIMITS.maxKeys) return void (answer.value = null)
    const request = typedRequest(claim(), fps(), list)
    if (!request) return void (answer.value = null)
    const began = performance.now()
    answer.value = judge(request)
    tookMs.value = performance.now() - began
  }
  function soon() {
    if (pause) clearTimeout(pause)
    cancelAnimationFrame(waiting)
    if (tookMs.value <= QUICK_MS) waiting = requestAnimationFrame(run)
    else pause = setTimeout(() => (waiting = requestAnimationFrame(run)), Math.min(600, tookMs.value * 4))
  }
  onMounted(() => watch([keys, claim, fps], soon, { immediate: true }))
  onBeforeUnmount(() => {
    if (pause) clearTimeout(pause)
    cancelAnimationFrame(waiting)
  })
  return { answer, tookMs }
}
