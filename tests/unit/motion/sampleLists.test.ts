/**
 * Seventy-two lists that came with the brief (fixtures/lists.json, provenance in fixtures/README.md): made by an eighth-order
 * Runge–Kutta method at tolerance 1e-10, pencil and rounding added, most of them with one fault.
 */
import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { judge } from '../../../utils/motion'
import type { ReadingCheck } from '../../../utils/motion'

interface SampleList {
  id: string
  request: ReadingCheck
  truth: { kind: string, frames: number[], size?: number, reads?: string | null }
}

const lists = JSON.parse(readFileSync(new URL('./fixtures/lists.json', import.meta.url), 'utf8')) as SampleList[]

describe('lists with a known truth', () => {
  it('has all of them', () => expect(lists).toHaveLength(72))

  it.each(lists.map(list => [`${list.id} ${list.request.law}, ${list.truth.kind}`, list] as const))('%s', (_name, { request, truth }) => {
    const result = judge(request)
    const kinds = [...new Set(result.findings.map(finding => finding.kind))]
    const told = result.findings.flatMap(finding => finding.frames).sort((a, b) => a - b)
    if (truth.kind === 'clean') {
      expect(kinds).toEqual([])
      expect(result.verdict).toBe('holds')
    } else {
      expect(kinds).toEqual([truth.kind])
      expect(result.verdict).toBe('breaks')
    }
    if (truth.kind === 'misplaced') expect(told).toEqual(truth.frames)
    if (truth.kind === 'held' || truth.kind === 'skipped') {
      const place = (frame: number | undefined) => request.keys.findIndex(key => key.frame === frame)
      expect(told).toHaveLength(1)
      expect(Math.abs(place(told[0]) - place(truth.frames[0]))).toBeLessThanOrEqual(1)
    }
    if (truth.reads) expect(result.readsAs[0]?.law).toBe(truth.reads)
    // 5 %: the worst of these lists is a topple of ten drawings on tenths of a degree.
    if (truth.size !== undefined) expect(Math.abs((result.size?.value ?? NaN) / truth.size - 1)).toBeLessThan(0.05)
  })
})
