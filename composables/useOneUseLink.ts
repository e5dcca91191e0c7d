import type { LinkAnswer } from '~/utils/contracts/people'
import { refusedBy } from '~/utils/refusal'

/**
 * The one-use link that this page was opened by. Its secret stands behind the `#`, which a browser sends to nobody: only
 * the page itself can read it, once it is on screen.
 */
export function useOneUseLink(kind: LinkAnswer['kind']) {
  const token = ref('')
  const state = ref<'reading' | 'open' | 'over' | 'none'>('reading')
  const whose = ref<LinkAnswer | null>(null)
  /** Why the link does not work. */
  const why = ref('')

  async function look() {
    token.value = window.location.hash.slice(1)
    state.value = token.value === '' ? 'none' : 'reading'
    if (token.value === '') return
    try {
      const answer = await $fetch<LinkAnswer>('/api/invitations/look', { method: 'POST', body: { token: token.value } })
      whose.value = answer
      state.value = answer.kind === kind ? 'open' : 'over'
      if (answer.kind !== kind) why.value = 'This link is for another page. Open it from the letter as it stands there.'
    } catch (failure) {
      state.value = 'over'
      const { issues, message } = refusedBy(failure)
      why.value = issues[0]?.message ?? message
    }
  }
  onMounted(() => {
    void look()
    // Another link opened in the same window changes nothing but what stands behind the #.
    window.addEventListener('hashchange', look)
  })
  onBeforeUnmount(() => window.removeEventListener('hashchange', look))
  return { token, state, whose, why }
}
