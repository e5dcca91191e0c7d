import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { Setting } from '~/server/models'
import { afterCommit, isWriting, row, rows, run, write } from '~/server/models/database'
import { openEmptyStore } from '../../../helpers/store'

let close: () => Promise<void>
beforeEach(async () => {
  close = await openEmptyStore()
})
afterEach(() => close())

const keys = async () => (await rows<{ key: string }>('SELECT key FROM settings ORDER BY key')).map(({ key }) => key)
const put = (key: string) => Setting.create({ key, value: 'x' })
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms))

describe('every connection', () => {
  const pragmas = async () => ({
    foreignKeys: (await row<{ foreign_keys: number }>('PRAGMA foreign_keys'))?.foreign_keys,
    // 2 is FULL: what was answered survives a power cut.
    synchronous: (await row<{ synchronous: number }>('PRAGMA synchronous'))?.synchronous,
    patience: (await row<{ timeout: number }>('PRAGMA busy_timeout'))?.timeout,
    journal: (await row<{ journal_mode: string }>('PRAGMA journal_mode'))?.journal_mode,
  })
  const wanted = { foreignKeys: 1, synchronous: 2, patience: 5000, journal: 'wal' }

  it('reads under the settings that the store relies on', async () => expect(await pragmas()).toEqual(wanted))
  it('writes under them too, although each transaction opens a connection of its own', async () => {
    for (let i = 0; i < 3; i++) expect(await write(pragmas)).toEqual(wanted)
  })
})

describe('write', () => {
  it('stores all of it', async () => {
    await write(async () => {
      await put('one')
      await put('two')
    })
    expect(await keys()).toEqual(['one', 'two'])
  })

  it('stores none of it when the last step fails (2.3.3)', async () => {
    const failing = write(async () => {
      await put('one')
      await run("UPDATE settings SET value = 'changed'")
      throw new Error('the last step')
    })
    await expect(failing).rejects.toThrow('the last step')
    expect(await keys()).toEqual([])
  })

  it('takes raw SQL and models into the same transaction without being told', async () => {
    const failing = write(async () => {
      await run("INSERT INTO settings (key, value) VALUES ('raw', 'x')")
      await put('model')
      // Its own connection sees both; that nothing slipped outside shows after the failure.
      expect(await keys()).toEqual(['model', 'raw'])
      throw new Error('no')
    })
    await expect(failing).rejects.toThrow('no')
    expect(await keys()).toEqual([])
  })

  it('joins an outer write: the inner part falls with the outer one', async () => {
    const failing = write(async () => {
      await write(() => put('inner'))
      throw new Error('outer')
    })
    await expect(failing).rejects.toThrow('outer')
    expect(await keys()).toEqual([])
  })

  it('shows a reader what was committed, and nothing half-written', async () => {
    let written = () => {}
    let read = () => {}
    const isWritten = new Promise<void>((resolve) => (written = resolve))
    const isRead = new Promise<void>((resolve) => (read = resolve))
    const writer = write(async () => {
      await put('half')
      written()
      await isRead
      await put('whole')
    })
    await isWritten
    const seen = await keys()
    read()
    await writer
    expect(seen).toEqual([])
    expect(await keys()).toEqual(['half', 'whole'])
  })

  it('goes on after a failure: the next writer is not kept waiting', async () => {
    await Promise.allSettled([write(async () => { throw new Error('first') }), write(() => put('second'))])
    expect(await keys()).toEqual(['second'])
  })

  it('50 writers at once lose nothing and meet no SQLITE_BUSY, with readers between them', async () => {
    await run("INSERT INTO settings (key, value) VALUES ('count', '0')")
    let reads = 0
    const readers = Array.from({ length: 5 }, async () => {
      while (reads < 100) {
        await keys()
        reads += 1
        await pause(1)
      }
    })
    const results = await Promise.allSettled(
      Array.from({ length: 50 }, (_, i) =>
        write(async () => {
          // Read, wait, write: whoever came in between would be lost.
          const before = await row<{ value: string }>("SELECT value FROM settings WHERE key = 'count'")
          await pause(i % 3)
          await run("UPDATE settings SET value = :value WHERE key = 'count'", { value: String(Number(before?.value) + 1) })
          await put(`writer-${String(i).padStart(2, '0')}`)
        }),
      ),
    )
    await Promise.all(readers)
    expect(results.flatMap((result) => (result.status === 'rejected' ? [String(result.reason)] : []))).toEqual([])
    expect((await row<{ value: string }>("SELECT value FROM settings WHERE key = 'count'"))?.value).toBe('50')
    expect(await keys()).toHaveLength(51)
    expect(reads).toBeGreaterThan(99)
  })
})

describe('afterCommit', () => {
  it('waits for the commit, runs once, and finds itself outside of the transaction', async () => {
    const heard: string[] = []
    await write(async () => {
      afterCommit(() => heard.push(`outside: ${!isWriting()}`))
      await put('one')
      heard.push('written')
    })
    expect(heard).toEqual(['written', 'outside: true'])
  })

  it('is silent after a rollback', async () => {
    const heard: string[] = []
    await expect(write(async () => {
      afterCommit(() => heard.push('news'))
      await put('one')
      throw new Error('no')
    })).rejects.toThrow('no')
    expect(heard).toEqual([])
  })

  it('is silent when the commit itself fails', async () => {
    const heard: string[] = []
    await run('CREATE TABLE parents (id INTEGER PRIMARY KEY)')
    await run('CREATE TABLE children (parent INTEGER REFERENCES parents (id) DEFERRABLE INITIALLY DEFERRED)')
    await expect(write(async () => {
      afterCommit(() => heard.push('news'))
      // A deferred key is only missed at the commit.
      await run('INSERT INTO children (parent) VALUES (1)')
    })).rejects.toThrow(/FOREIGN KEY/)
    expect(heard).toEqual([])
    expect(await rows('SELECT * FROM children')).toEqual([])
    await write(() => put('next'))
    expect(await keys()).toEqual(['next'])
  })

  it('runs at once where nothing is being written, and a listener that throws harms nobody', async () => {
    const heard: string[] = []
    afterCommit(() => heard.push('at once'))
    expect(heard).toEqual(['at once'])
    await expect(write(async () => {
      afterCommit(() => { throw new Error('deaf') })
      afterCommit(() => heard.push('the next one'))
      await put('one')
    })).resolves.toBeUndefined()
    expect(heard).toEqual(['at once', 'the next one'])
    expect(await keys()).toEqual(['one'])
  })

  it('can start a write of its own', async () => {
    let second: Promise<unknown> | null = null
    await write(async () => {
      afterCommit(() => (second = write(() => put('second'))))
      await put('first')
    })
    await second
    expect(await keys()).toEqual(['first', 'second'])
  })
})

describe('what people sent', () => {
  it('stays a value and never becomes SQL (1.2.4)', async () => {
    for (const value of ["'; DROP TABLE settings; --", ':key', '$1 ? ?', "\\'", 'a\u0000b', '"', '--'])
      await run("INSERT INTO settings (key, value) VALUES (:key, :value)", { key: `k${value}`, value })
    const stored = await rows<{ value: string }>('SELECT value FROM settings ORDER BY rowid')
    expect(stored.map(({ value }) => value)).toEqual(["'; DROP TABLE settings; --", ':key', '$1 ? ?', "\\'", 'a\u0000b', '"', '--'])
  })
})
