import { describe, expect, it } from 'vitest'
import { insideOnly } from '~/utils/insideOnly'

describe('where one goes after signing in', () => {
  it.each([
    'https://elsewhere.example/',
    '//elsewhere.example/',
    '/\\elsewhere.example/',
    '/\t/elsewhere.example/',
    '/.//elsewhere.example/',
    '/p/..//elsewhere.example/',
    'javascript:alert(1)',
    'p/quayside',
    '',
    undefined,
    ['/p/quayside', '/me'],
    '/sign-in?to=/sign-in',
    'http://[',
  ])('never leads anywhere else: %j', (wanted) => {
    expect(insideOnly(wanted)).toBe('/')
  })

  it.each(['/', '/me', '/p/quayside/shots/CLK-110?take=3&frame=37', '/p/quayside#wall'])('keeps a path of this application: %s', (wanted) => {
    expect(insideOnly(wanted)).toBe(wanted)
  })
})
