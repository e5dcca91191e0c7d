import { describe, expect, it } from 'vitest'
import { refusedPassword } from '~/server/utils/passwordRules'
import { password as passwordShape } from '~/utils/contracts/common'

const EMAIL = 'mirel.isbrand@harbour.example'
const refused = (password: string) => refusedPassword(password, EMAIL)

describe('which passwords are refused', () => {
  it.each(['qwertyuiop', '1234567890', 'QwertyUIOP', 'password123', 'basketball', '1q2w3e4r5t'])(
    '6.2.4: one of the commonest, in any case of letters: %s',
    async (common) => {
      expect(await refused(common)).toMatch(/commonest/)
    },
  )

  it.each(['password1234', 'sunshine!!', 'dragondragon', 'letmeinletmein1', 'Tiltyard2026'])(
    '6.2.4: a common word stretched to the length: %s',
    async (stretched) => {
      expect(await refused(stretched)).toMatch(/commonest/)
    },
  )

  it.each(['aaaaaaaaaa', 'abababababab', 'xyzxyzxyzxyz', '💡💡💡💡💡💡'])('one small piece over and over: %s', async (monotone) => {
    expect(await refused(monotone)).toMatch(/repeats/)
  })

  it('one’s own address', async () => {
    expect(await refused(EMAIL)).toMatch(/address/)
    expect(await refused('Mirel.Isbrand')).toMatch(/address/)
  })

  it.each([
    'cranes walk at night',
    'onlysmallletterswithoutanydigit',
    '83746192650481',
    'żółć gęślą jaźń',
    '   spaces before and after   ',
    'n'.repeat(3) + 'o rules about signs or capitals',
  ])('6.2.5: no rule about which characters: %s', async (fine) => {
    expect(await refused(fine)).toBeNull()
    expect(passwordShape.safeParse(fine).data).toBe(fine)
  })

  it('6.2.1, 6.2.9: at least 10 characters, 64 and more are fine, 200 is the most', () => {
    const ofLength = (length: number) => passwordShape.safeParse('k9'.repeat(length).slice(0, length)).success
    expect([9, 10, 64, 65, 128, 200, 201].map(ofLength)).toEqual([false, true, true, true, true, true, false])
  })
})
