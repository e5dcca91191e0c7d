import { describe, expect, it } from 'vitest'
import { figureInWords } from '~/utils/drawing/figureWords'
import { jointInWords, spanLines } from '~/utils/drawing/spanWords'
import type { Figure, JudgedJoint, JudgedSpan } from '~/utils/motion/types'

const one = (kind: Figure['kind'], value: number, low: number, high: number, unit = ''): Figure => ({ kind, value, low, high, unit })

describe('figures', () => {
  it.each([
    [one('restitution', 0.62, 0.598, 0.641), 'Each bounce gives back 62 % (60–64) of its speed.'],
    [one('share-lost', 6.1, 5.2, 7.1, '%'), 'Each full swing loses 6.1 % (5.2–7.1) of its reach.'],
    [one('turns', 0.52, 0.512, 0.528, 'turns/s'), 'Turns 0.52 (0.51–0.53) times a second.'],
    [one('stop', 41.32, 40.9, 41.8, 'frame'), 'Comes to rest at frame 41.3 (40.9–41.8).'],
    [one('contact', 23, 23, 23, 'frame'), 'Touches at frame 23.'],
    [one('release', 31.2, 31.18, 31.23, 'frame'), 'Leaves the edge at frame 31.2 (31.18–31.23).'],
    [one('release-angle', 53.1, 52.4, 53.9, 'deg'), 'Leaves the edge 53.1° (52.4–53.9) from upright.'],
    [one('gravity', 9.6, 9.2, 10.1, 'm/s²'), 'Reads as a gravity of 9.6 (9.2–10) m/s².'],
    [one('gravity', 84, 80, 88, 'px/m'), 'Reads as 84 (80–88) px/m.'],
  ])('%j', (figure, words) => {
    expect(figureInWords(figure)).toBe(words)
  })
})

describe('spans', () => {
  const span = (from: number, to: number, law: JudgedSpan['law'], more: Partial<JudgedSpan> = {}): JudgedSpan => ({
    from, to, law, contact: false, verdict: 'holds', reason: null, misfit: 0.3, readsAs: [], size: null, figures: [], ...more,
  })
  const joint = (more: Partial<JudgedJoint> = {}): JudgedJoint => ({ frame: 20, contact: false, before: 12.14, after: 12.1, apart: 0, holds: true, ...more })

  it('are told one line each, with what they read as and how they meet', () => {
    const size = { value: 4.1, low: 3.8, high: 4.4, unit: 'm' }
    const lines = spanLines({ spans: [span(1, 20, 'topple', { size }), span(20, 41, 'odd-rule', { verdict: 'undecided', reason: 'Too few keys.' })], joints: [joint({ contact: true, after: -7.4 })] }, 'px')
    expect(lines[0]).toMatchObject({ law: 'topple', said: 'holds', more: ['Reads as 4.1 m (3.8–4.4).'], joint: { frame: 20, contact: true, broken: false } })
    expect(lines[1]).toMatchObject({ said: 'can’t be told: Too few keys.', joint: null })
  })
  it('say the speeds on both sides of a joint', () => {
    expect(jointInWords(joint(), 'px')).toBe('carries over, 12.1 px a frame')
    expect(jointInWords(joint({ contact: true, after: -7.4 }), 'px')).toBe('contact: 12.1 px a frame before, −7.4 after')
    expect(jointInWords(joint({ holds: false, after: 0.52 }), 'deg')).toBe('does not carry over: 12.1° a frame before, 0.52 after')
    expect(jointInWords(joint({ holds: false, before: null, apart: 3 }), 'px')).toBe('does not carry over: 3.0 px apart')
    expect(jointInWords(joint({ holds: false, apart: 3 }), 'px')).toBe('does not carry over: 3.0 px apart')
    expect(jointInWords(joint({ holds: false, apart: 0 }), 'px')).toBe('does not carry over')
  })
})
