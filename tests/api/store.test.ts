import { describe, expect, it } from 'vitest'
import { closeDatabase, rows, run } from '~/server/models/database'
import { temporaryFolder } from '../helpers/folder'
import { startServer } from '../helpers/server'
import { openStore } from '../helpers/store'

describe('a data folder', () => {
  it('that a newer version wrote is refused in one sentence, and left as it is', async () => {
    const dataDir = temporaryFolder()
    await openStore(dataDir)
    await run("INSERT INTO migrations (name) VALUES ('9999-later.sql')")
    await closeDatabase()
    const start = startServer({ demo: 'off', dataDir })
    await expect(start).rejects.toThrow(/The server ended at /)
    const said = String(await start.catch((problem: unknown) => problem))
    expect(said).toContain('This database was written by a newer version of Tiltyard (it knows "9999-later.sql"): start that version, or put a backup back.')
    expect(said).not.toMatch(/\n\s+at /)

    await expect(openStore(dataDir)).rejects.toThrow(/newer version/)
    expect(await rows('SELECT name FROM migrations ORDER BY name DESC LIMIT 1')).toEqual([{ name: '9999-later.sql' }])
    expect(await rows('SELECT * FROM people')).toEqual([])
    await closeDatabase()
  })

  it('keeps everything over a stop, a kill and a second start', async () => {
    const dataDir = temporaryFolder()
    const server = await startServer({ demo: 'off', dataDir })
    const make = (path: string, body: unknown, cookie = '') =>
      fetch(server.url + path, {
        method: 'POST', body: JSON.stringify(body),
        headers: { 'content-type': 'application/json', origin: server.url, ...(cookie ? { cookie } : {}) },
      })
    const keeper = await make('/api/first-keeper', { name: 'First', email: 'first@pier.example', password: 'lanterns on the long pier' })
    expect(keeper.status).toBe(201)
    const cookie = keeper.headers.getSetCookie().map((line) => line.split(';')[0]).join('; ')
    // What was answered is on the disk: nothing is given time to be written later.
    const made = await make('/api/productions', { slug: 'kept', title: 'Kept' }, cookie)
    expect(made.status).toBe(201)
    await server.kill()
    await server.restart()
    const wall = await fetch(`${server.url}/api/productions/kept/wall`, { headers: { cookie } })
    expect(await wall.json()).toMatchObject({ production: { slug: 'kept', title: 'Kept' }, sheets: [], eventNumber: 1 })
    expect((await server.stop()).forced).toBe(false)
  })
})
