import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll } from 'vitest'

/** A data folder that is taken away at the end of the test file. */
export function temporaryFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'tiltyard-data-'))
  folders.push(folder)
  return folder
}

const folders: string[] = []
afterAll(() => {
  for (const folder of folders) rmSync(folder, { recursive: true, force: true })
})
