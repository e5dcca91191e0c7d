let opening: Promise<void> | null = null

/** Set once by server/plugins/database.ts: the database is open, migrated and seeded when it resolves. */
export function setReady(promise: Promise<void>): void {
  opening = promise
}

/** Waits until the house is open. Nitro does not wait for plugins, so every route does. */
export async function ready(): Promise<void> {
  await (opening ?? Promise.reject(new Error('The database plugin has not run.')))
}
