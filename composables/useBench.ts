import { readBench, sameBench, writeBench } from '~/utils/bench/address'
import type { BenchSetup } from '~/utils/bench/setup'

/** Typing is not seen in the history: the address follows once a number stands for a moment. */
const WRITE_AFTER_MS = 200

/** What lies on the bench, and the address that says so. Going back and forth in the history lays it out again. */
export function useBench() {
  const route = useRoute()
  const router = useRouter()
  const setup = ref<BenchSetup>(readBench(route.query))
  const path = route.path
  let timer: ReturnType<typeof setTimeout> | null = null

  function write() {
    timer = null
    if (route.path === path) void router.replace({ query: writeBench(setup.value), hash: route.hash })
  }
  function change(part: Partial<BenchSetup>) {
    setup.value = { ...setup.value, ...part }
    if (timer) clearTimeout(timer)
    timer = setTimeout(write, WRITE_AFTER_MS)
  }
  watch(
    () => route.query,
    (query) => {
      if (timer || route.path !== path) return
      const asked = readBench(query)
      if (!sameBench(asked, setup.value)) setup.value = asked
    },
  )
  onBeforeUnmount(() => timer && clearTimeout(timer))
  return { setup: readonly(setup) as Readonly<Ref<BenchSetup>>, change }
}
