/** Preloaded into ESLint: its Nuxt configuration calls Object.groupBy, which Node.js has from 21 on. */
Object.groupBy ??= (items, keyOf) => {
  const groups = Object.create(null)
  let index = 0
  for (const item of items) (groups[keyOf(item, index++)] ??= []).push(item)
  return groups
}
