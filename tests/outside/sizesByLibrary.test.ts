/** Sizes against a general library: ml-levenberg-marquardt over motion integrated by odex, fitting the same lists. */
import { describe, expect, it } from 'vitest'
import { againstLibrary } from '../bench/judgeSpeed'
import { SIZED, makeLists } from '../bench/lists/make'

describe('sizes of clean topples and swings', () => {
  it('are the library’s to one in a thousand', () => {
    const { lists, agree, apart } = againstLibrary(makeLists(10, 41, SIZED), 10)
    expect(lists).toBe(10)
    expect(agree).toBe(10)
    expect(apart).toBeLessThan(0.001)
  }, 60_000)
})
