import { useSessionStore } from '~/stores/session'
import { insideOnly } from '~/utils/insideOnly'

declare module '#app' {
  interface PageMeta {
    /** Who may open the page: `anyone`, a `keeper`; whoever is signed in when nothing is said. */
    access?: 'anyone' | 'keeper'
  }
}

/** Sends everybody where they can do something: a new installation to its first keeper, a stranger to the sign-in page. */
export default defineNuxtRouteMiddleware(async (to) => {
  const session = useSessionStore()
  if (!session.loaded) await session.load()
  // An address that no page answers to is told as such, signed in or not.
  if (to.matched.length === 0) return
  if (session.empty !== (to.path === '/first-keeper')) return navigateTo(session.empty ? '/first-keeper' : '/', { replace: true })
  if (to.meta.access === 'anyone') {
    return to.path === '/sign-in' && session.me ? navigateTo(insideOnly(to.query.to), { replace: true }) : undefined
  }
  if (!session.me) return navigateTo({ path: '/sign-in', query: to.fullPath === '/' ? {} : { to: to.fullPath } }, { replace: true })
  if (to.meta.access === 'keeper' && !session.me.keeper) return abortNavigation({ statusCode: 404, message: 'There is nothing here.' })
})
