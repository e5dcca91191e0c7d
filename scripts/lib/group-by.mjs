/** Node 20 has no Object.groupBy yet, which a package under Nuxt's ESLint configuration calls. Nothing else uses this. */
Object.groupBy ??= (items, keyOf) => {
  const groups = Object.create(null)
  let index = 0
  for (const item of items) (groups[keyOf(item, index++)] ??= []).push(item)
  return groups
}
