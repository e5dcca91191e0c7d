/** A shot's address has its code in capitals: typed small, it leads to the same page under the same address. */
export default defineNuxtRouteMiddleware((to) => {
  const { code } = to.params
  if (typeof code !== 'string' || code === code.toUpperCase()) return
  return navigateTo({ name: to.name!, params: { ...to.params, code: code.toUpperCase() }, query: to.query, hash: to.hash }, { replace: true })
})
