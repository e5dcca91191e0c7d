import { describe, expect, it, vi } from 'vitest'

// What a wait or a network is needs no running server; the rest of the module is tested against one (tests/api/limits).
vi.mock('#imports', () => import('../../../helpers/imports'))
vi.mock('#sealed-cookie', () => ({ clearUserSession: vi.fn(), getUserSession: vi.fn(), setUserSession: vi.fn() }))
const { networkOf, waitBefore } = await import('~/server/utils/limits')

describe('2.4.1: whom an address counts as', () => {
  it.each([
    ['203.0.113.7', '203.0.113.7'],
    ['::ffff:203.0.113.7', '203.0.113.7'],
    ['2001:db8:12:34:5678:9abc:def0:1', '2001:db8:12:34::/64'],
    ['2001:DB8:0012:0034::1', '2001:db8:12:34::/64'],
    ['2001:db8::1', '2001:db8:0:0::/64'],
    ['fe80::1%eth0', 'fe80:0:0:0::/64'],
    ['::1', '0:0:0:0::/64'],
    ['unknown', 'unknown'],
  ])('%s counts as %s', (address, network) => {
    expect(networkOf(address)).toBe(network)
  })

  it('two addresses of one customer’s network count together, two networks do not', () => {
    expect(networkOf('2001:db8:1:2::a')).toBe(networkOf('2001:db8:1:2:ffff::b'))
    expect(networkOf('2001:db8:1:2::a')).not.toBe(networkOf('2001:db8:1:3::a'))
  })
})

describe('6.3.1: how long the n-th bad try on an account waits', () => {
  it('five are free, then ½, 1, 2, 4 and at most 8 seconds', () => {
    expect([1, 5, 6, 7, 8, 9, 10, 11, 500, 5000].map(waitBefore)).toEqual([0, 0, 500, 1000, 2000, 4000, 8000, 8000, 8000, 8000])
  })
})
