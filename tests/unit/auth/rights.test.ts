import { describe, expect, it } from 'vitest'
import { rightsOf } from '@/lib/access/rights'
import { addressOf } from '@/lib/auth/address'
import { hashPassword, passwordMatches } from '@/lib/auth/passwords'
import { hashKey, newKey } from '@/lib/loggers/key'
import { shownCode, typedCode } from '@/lib/loggers/authorize-device'
import type { Rights } from '@/shared/schemas'

const standing = { vesselId: '1', owns: false, fullRecord: false, keeps: false, roles: [] as string[] }
const granted = (rights: Rights): string[] =>
  Object.entries(rights)
    .filter(([, may]) => may)
    .map(([name]) => name)
    .sort()

describe('rights on a vessel', () => {
  it('are an owner’s: all but the shop’s work', () => {
    expect(granted(rightsOf({ ...standing, owns: true, fullRecord: true }))).toEqual([
      'acknowledge',
      'askVisit',
      'changeQuietHours',
      'changeSettings',
      'changeVessel',
      'fullRecord',
      'giveAccess',
      'registerLogger',
      'setAboard',
      'setStatement',
    ])
  })
  it('are a technician’s: figures, visits, notices; no loggers', () => {
    expect(granted(rightsOf({ ...standing, roles: ['technician'] }))).toEqual([
      'acknowledge',
      'askVisit',
      'changeSettings',
      'setStatement',
      'workVisit',
    ])
  })
  it('are an installer’s: figures and loggers; no visits, no notices', () => {
    expect(granted(rightsOf({ ...standing, roles: ['installer'] }))).toEqual([
      'changeSettings',
      'registerLogger',
      'setStatement',
    ])
  })
  it('are a manager’s: the technician’s and installer’s, and assigning', () => {
    expect(granted(rightsOf({ ...standing, roles: ['manager'] }))).toEqual([
      'acknowledge',
      'askVisit',
      'assignVisit',
      'changeSettings',
      'registerLogger',
      'setStatement',
      'workVisit',
    ])
  })
  it('let only the owner give access, whatever else somebody is', () => {
    const all = { ...standing, fullRecord: true, keeps: true, roles: ['technician', 'installer', 'manager'] }
    expect(rightsOf(all).giveAccess).toBe(false)
  })
  it('are none for somebody who merely sees it', () => {
    expect(granted(rightsOf(standing))).toEqual([])
  })
})

describe('secrets', () => {
  it('match only their own hash, and nothing without one', async () => {
    const hash = await hashPassword('watch the needle')
    expect(hash).toMatch(/^\$argon2id\$/)
    expect(await passwordMatches(hash, 'watch the needle')).toBe(true)
    expect(await passwordMatches(hash, 'watch the needles')).toBe(false)
    expect(await passwordMatches(null, 'watch the needle')).toBe(false)
  })
  it('make logger keys of 256 bits, kept as a hash of 32 bytes', () => {
    const key = newKey()
    expect(Buffer.from(key.replace('mwk_', ''), 'base64url')).toHaveLength(32)
    expect(hashKey(key)).toHaveLength(32)
    expect(newKey()).not.toBe(key)
  })
  it('take a claim’s code however it is typed', () => {
    expect(typedCode(' wdjb mjht ')).toBe('WDJBMJHT')
    expect(shownCode('WDJBMJHT')).toBe('WDJB-MJHT')
  })
})

describe('where a request comes from', () => {
  it('is what the nearest hop wrote, not what the sender claims', () => {
    expect(addressOf(new Headers({ 'x-forwarded-for': '10.0.0.1, 203.0.113.7' }))).toBe('203.0.113.7')
    expect(addressOf(new Headers())).toBe('unknown')
  })
})
