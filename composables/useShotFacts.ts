import type { ShotPage } from '~/utils/contracts/take'
import { shotPath } from '~/stores/shot'
import { useSessionStore } from '~/stores/session'
import type { Facts } from '~/utils/permissions'

/** Loads a shot for its forms (claim, posting, editing), and what the table of permissions wants to know. Ends in the error page where there is none. */
export async function useShotFacts(form: 'claim' | 'post' | 'edit') {
  const route = useRoute()
  const session = useSessionStore()
  const production = String(route.params.production)
  const code = String(route.params.code)
  const request = useRequestFetch()
  // Each form asks for itself: one that gives way to the next must not hand its old answer on.
  const { data, error } = await useAsyncData(`shot-${form}:${production}:${code}`, () => request<ShotPage>(shotPath(production, code)))
  if (error.value || !data.value)
    throw createError({ statusCode: error.value?.statusCode ?? 404, message: 'There is nothing here.', fatal: true })
  const page = data as Ref<ShotPage>
  const facts = computed<Facts>(() => ({
    ownShot: page.value.animator !== null && page.value.animator.id === session.me?.id,
    shotRuled: page.value.takes.some(({ ruling }) => ruling !== null),
  }))
  return { production, code, page, facts, session }
}
