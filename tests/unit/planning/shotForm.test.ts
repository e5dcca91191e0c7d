import { describe, expect, it } from 'vitest'
import type { Production } from '~/utils/contracts/production'
import type { ShotFacts } from '~/utils/contracts/take'
import { emptyShotForm, readNewSequence, readNewShot, readShotChange, shotFormOf, shotRows } from '~/utils/planning/shotForm'

const mira = '7d3f3a52-7c8a-4a34-9f0e-0d6c1f3f2b11'
const id = '01912f0e-6c1a-7c3a-8a3f-0d6c1f3f2b12'
const production: Production = {
  slug: 'q', title: 'Q', role: 'coordinator', members: [{ id: mira, name: 'Mira Ilves', role: 'animator' }],
  sequences: [{ code: 'BRK', title: 'Breakwater', position: 0 }, { code: 'CLK', title: 'Clock', position: 1 }],
}
const facts: ShotFacts = {
  sequence: production.sequences[1]!, code: 'CLK-110', title: 'Tower', brief: 'b', firstFrame: 1, lastFrame: 85, fps: 23.976, position: 10,
  dueOn: null, animator: { id: mira, name: 'Mira Ilves' }, supervisor: null, claim: null, version: 4, desk: 'not-started', deskSince: '',
}

describe('a new shot', () => {
  it('is read with small letters made large and what is empty left out', () => {
    const form = { ...emptyShotForm(production), code: 'clk-120 ', title: ' Bell ', lastFrame: '96' }
    expect(readNewShot(form, id).body).toEqual({
      clientId: id, code: 'CLK-120', title: 'Bell', sequence: 'CLK', firstFrame: 1, lastFrame: 96, fps: 24, brief: '', dueOn: null, animator: null, supervisor: null,
    })
  })
  it('says what is wrong by field', () => {
    const form = { ...emptyShotForm(production), code: 'clk 120', lastFrame: 'x', fps: '900', firstFrame: '1.5' }
    expect(Object.keys(readNewShot(form, id).complaints ?? {}).sort()).toEqual(['code', 'firstFrame', 'fps', 'lastFrame', 'title'])
  })
  it('opens a sequence where there is none', () => {
    expect(emptyShotForm({ ...production, sequences: [] }).sequence).toBe('new')
    expect(emptyShotForm(production, 'BRK').sequence).toBe('BRK')
    expect(readNewSequence({ ...emptyShotForm(production), newSequence: { code: 'chn', title: '' } }).complaints).toEqual({ 'newSequence.title': 'Write something here.' })
  })
})

describe('a changed shot', () => {
  const opened = shotFormOf(facts)
  it('sends only what was touched', () => {
    expect(readShotChange({ ...opened, title: 'The tower', supervisor: mira }, opened, 4).body).toEqual({ title: 'The tower', supervisor: mira, version: 4 })
    expect(readShotChange(opened, opened, 4).body).toEqual({ version: 4 })
  })
  it('takes somebody off', () => {
    expect(readShotChange({ ...opened, animator: '' }, opened, 4).body).toEqual({ animator: null, version: 4 })
  })
  it('tells an emptied number as a fault', () => {
    expect(Object.keys(readShotChange({ ...opened, fps: '', position: '' }, opened, 4).complaints ?? {}).sort()).toEqual(['fps', 'position'])
  })
  it('is said line by line', () => {
    const rows = new Map(shotRows({ ...opened, dueOn: '2026-12-04' }, production))
    expect([rows.get('Animator'), rows.get('Supervisor'), rows.get('Due'), rows.get('Frames')]).toEqual(['Mira Ilves', 'nobody', '4 Dec 2026', '1–85'])
  })
})
