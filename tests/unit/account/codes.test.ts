import { describe, expect, it } from 'vitest'
import { dateOf, noonOf } from '@/components/account/dates'
import { deviceName } from '@/components/account/device-name'
import { newRecoveryCodes, stepOf } from '@/lib/account/codes'
import { seal, unseal } from '@/lib/account/sealed'
import { auditWords } from '@/lib/joining/audit-words'

describe('codes by time', () => {
  // RFC 6238, appendix B: the SHA-1 secret "12345678901234567890" in base 32, codes cut to their last six digits.
  const SECRET = 'GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ'
  it.each([
    [59, '287082'],
    [1_111_111_109, '081804'],
    [1_234_567_890, '005924'],
    [2_000_000_000, '279037'],
  ])('at %i s are those of the RFC', (seconds, code) => {
    expect(stepOf(SECRET, code, new Date(seconds * 1000))).toBe(Math.floor(seconds / 30))
  })

  it('count a step early or late, and no more; spaces are how people write them', () => {
    const at = (seconds: number) => stepOf(SECRET, '081 804', new Date((1_111_111_109 + seconds) * 1000))
    expect([at(0), at(30), at(-30)]).toEqual(Array(3).fill(37_037_036))
    expect([at(61), at(-60)]).toEqual([null, null])
    expect(stepOf(SECRET, '', new Date())).toBeNull()
    expect(stepOf(SECRET, 'abcdef', new Date())).toBeNull()
  })
})

describe('recovery codes', () => {
  it('are ten, different, of 80 bits', () => {
    const { codes, hashes } = newRecoveryCodes()
    expect(new Set(codes).size).toBe(10)
    for (const code of codes) expect(code).toMatch(/^[0-9a-f]{5}(-[0-9a-f]{5}){3}$/)
    expect(hashes.every((hash) => hash.length === 32)).toBe(true)
  })
})

describe('a sealed secret', () => {
  it('opens again, differs each time, and does not open when a byte was changed', () => {
    const sealed = seal('GEZDGNBV')
    expect(unseal(sealed)).toBe('GEZDGNBV')
    expect(seal('GEZDGNBV')).not.toBe(sealed)
    const bytes = Buffer.from(sealed, 'base64')
    bytes[bytes.length - 1] = (bytes[bytes.length - 1] ?? 0) ^ 1
    expect(unseal(bytes.toString('base64'))).toBeNull()
    expect(unseal('')).toBeNull()
  })
})

describe('words and dates', () => {
  it('name a device, a noon on board, and what was done', () => {
    expect(deviceName('Mozilla/5.0 (Linux; Android 14) AppleWebKit/537.36 Chrome/120 Safari/537.36')).toBe(
      'Chrome on Android',
    )
    expect(deviceName(null)).toBe('A program')
    expect(noonOf('2026-12-01', 3600)).toBe('2026-12-01T11:00:00.000Z')
    expect(dateOf('2026-12-01T23:30:00Z', 3600)).toBe('2026-12-02')
    expect(auditWords({ action: 'access.given', detail: { level: 'full' }, shopName: 'Holm' })).toBe(
      'let Holm see the full record',
    )
    expect(auditWords({ action: 'some.other-thing', detail: {}, shopName: null })).toBe('some other thing')
  })
})
