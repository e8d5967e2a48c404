import { describe, expect, it } from 'vitest'
import { parseSenml } from '@/ingest/parse-senml'
import { CHANNELS, REASONS, type RecordColumns } from '@/ingest/records'

/**
 * Packs of RFC 8428 section 5.1 and their resolved names and times: 5.1.4 is the RFC's own resolved form, the
 * others agree with the working group's resolved examples. Most of their names are no channels of ours, so what is
 * checked is name, time and the reason; values and units are checked with channels of ours below.
 */
const NOW_MS = Date.UTC(2026, 0, 1)

const entries = (columns: RecordColumns) =>
  Array.from({ length: columns.count }, (_, i) => ({
    n: columns.names[columns.name[i] ?? -1],
    t: (columns.at[i] ?? NaN) / 1000,
    reason: REASONS[columns.reason[i] ?? 0],
    relative: columns.relative[i] === 1,
  }))
const resolve = async (pack: unknown) => entries(await parseSenml(JSON.stringify(pack), NOW_MS))

describe('RFC 8428 section 5.1', () => {
  it('5.1.1: a single point without a time is of now', async () => {
    expect(await resolve([{ n: 'urn:dev:ow:10e2073a01080063', u: 'Cel', v: 23.1 }])).toEqual([
      { n: 'urn:dev:ow:10e2073a01080063', t: NOW_MS / 1000, reason: 'unknown-channel', relative: true },
    ])
  })

  it('5.1.2: base name, base time and negative relative times', async () => {
    const resolved = await resolve([
      {
        bn: 'urn:dev:ow:10e2073a0108006:',
        bt: 1276020076.001,
        bu: 'A',
        bver: 5,
        n: 'voltage',
        u: 'V',
        v: 120.1,
      },
      { n: 'current', t: -5, v: 1.2 },
      { n: 'current', t: -4, v: 1.3 },
      { n: 'current', t: -3, v: 1.4 },
      { n: 'current', t: -2, v: 1.5 },
      { n: 'current', t: -1, v: 1.6 },
      { n: 'current', v: 1.7 },
    ])
    expect(resolved.map(({ n, t }) => [n, t])).toEqual([
      ['urn:dev:ow:10e2073a0108006:voltage', 1276020076.001],
      ['urn:dev:ow:10e2073a0108006:current', 1276020071.001],
      ['urn:dev:ow:10e2073a0108006:current', 1276020072.001],
      ['urn:dev:ow:10e2073a0108006:current', 1276020073.001],
      ['urn:dev:ow:10e2073a0108006:current', 1276020074.001],
      ['urn:dev:ow:10e2073a0108006:current', 1276020075.001],
      ['urn:dev:ow:10e2073a0108006:current', 1276020076.001],
    ])
  })

  it('5.1.3 and 5.1.4: relative times within a pack of several measurements', async () => {
    const name = 'urn:dev:ow:10e2073a01080063'
    const resolved = await resolve([
      { bn: name, bt: 1320067464, bu: '%RH', v: 20 },
      { u: 'lon', v: 24.30621 },
      { u: 'lat', v: 60.07965 },
      { t: 60, v: 20.3 },
      { u: 'lon', t: 60, v: 24.30622 },
      { u: 'lat', t: 60, v: 60.07965 },
      { t: 120, v: 20.7 },
      { u: 'lon', t: 120, v: 24.30623 },
      { u: 'lat', t: 120, v: 60.07966 },
      { u: '%EL', t: 150, v: 98 },
      { t: 180, v: 21.2 },
      { u: 'lon', t: 180, v: 24.30628 },
      { u: 'lat', t: 180, v: 60.07967 },
    ])
    expect(resolved.map(({ t }) => t)).toEqual([
      1320067464, 1320067464, 1320067464, 1320067524, 1320067524, 1320067524, 1320067584, 1320067584,
      1320067584, 1320067614, 1320067644, 1320067644, 1320067644,
    ])
    expect(new Set(resolved.map(({ n }) => n))).toEqual(new Set([name]))
  })

  it('5.1.5: values that are no numbers are of no channel here', async () => {
    const resolved = await resolve([
      { bn: 'urn:dev:ow:10e2073a01080063:', n: 'temp', u: 'Cel', v: 23.1 },
      { n: 'label', vs: 'Machine Room' },
      { n: 'open', vb: false },
      { n: 'nfv-reader', vd: 'aGkgCg' },
    ])
    expect(resolved.map(({ reason }) => reason)).toEqual(Array(4).fill('unknown-channel'))
  })

  it('5.1.6: a second base name with the first base time', async () => {
    const resolved = await resolve([
      { bn: '2001:db8::2/', bt: 1320078429, n: 'temperature', u: 'Cel', v: 25.2 },
      { n: 'humidity', u: '%RH', v: 30 },
      { bn: '2001:db8::1/', n: 'temperature', u: 'Cel', v: 12.3 },
      { n: 'humidity', u: '%RH', v: 67 },
    ])
    expect(resolved.map(({ n, t }) => [n, t])).toEqual([
      ['2001:db8::2/temperature', 1320078429],
      ['2001:db8::2/humidity', 1320078429],
      ['2001:db8::1/temperature', 1320078429],
      ['2001:db8::1/humidity', 1320078429],
    ])
  })

  it('5.1.7: a record with a base name alone measures nothing', async () => {
    const resolved = await resolve([{ bn: 'urn:dev:ow:10e2073a01080063:' }, { n: 'temp', u: 'Cel', v: 23.1 }])
    expect(resolved.map(({ n }) => n)).toEqual(['urn:dev:ow:10e2073a01080063:temp'])
  })
})

describe('RFC 8428 section 4', () => {
  const one = async (pack: unknown) => {
    const columns = await parseSenml(JSON.stringify(pack), NOW_MS)
    return {
      channel: CHANNELS[columns.channel[0] ?? -1],
      value: columns.value[0],
      at: columns.at[0],
      reason: REASONS[columns.reason[0] ?? 0],
    }
  }

  it('4.5.3: 2**28 parts relative from absolute time', async () => {
    expect((await one([{ n: 'vacuum', u: 'Pa', v: 1, t: 2 ** 28 - 1 }])).at).toBe(
      NOW_MS + (2 ** 28 - 1) * 1000,
    )
    expect((await one([{ n: 'vacuum', u: 'Pa', v: 1, t: 2 ** 28 }])).at).toBe(
      Date.parse('1978-07-04T21:24:16Z'),
    )
  })

  it('4.1: base time and time, base value and value are added; a missing one is nought', async () => {
    expect((await one([{ bt: 1.7e9, n: 'vacuum', u: 'Pa', v: 1, t: 2 }])).at).toBe(1_700_000_002_000)
    expect((await one([{ bv: 30000, n: 'vacuum', u: 'Pa', v: 12 }])).value).toBe(30012)
    expect((await one([{ bv: 30000, n: 'vacuum', u: 'Pa' }])).value).toBe(30000)
  })

  it('4.2: the base unit stands where no unit does', async () => {
    expect(await one([{ bu: 'Cel', n: 'air', v: 18 }])).toMatchObject({
      channel: 'air',
      value: 18,
      reason: null,
    })
    expect((await one([{ bu: 'Cel', n: 'vacuum', u: 'Pa', v: 18 }])).reason).toBeNull()
  })

  it('4.4: a version over 10 and an unknown field ending in "_" are refused, other unknown fields ignored', async () => {
    await expect(one([{ bver: 11, n: 'vacuum', u: 'Pa', v: 1 }])).rejects.toThrow(/version 11/)
    await expect(one([{ n: 'vacuum', u: 'Pa', v: 1, secret_: 1 }])).rejects.toThrow(/secret_/)
    expect((await one([{ bver: 10, n: 'vacuum', u: 'Pa', v: 1, note: 'x' }])).reason).toBeNull()
  })

  it('4.3: exactly one kind of value', async () => {
    expect((await one([{ n: 'pump', vb: true, v: 1 }])).reason).toBe('bad-value')
    expect((await one([{ n: 'pump', v: 1 }])).reason).toBe('bad-value')
    expect((await one([{ n: 'vacuum', u: 'Pa', vs: '30000' }])).reason).toBe('bad-value')
  })
})

describe('RFC 8798 section 3', () => {
  it('hPa is a hundred pascal; kPa is read in the same manner', async () => {
    const pressure = async (n: string, u: string, v: number) => {
      const columns = await parseSenml(JSON.stringify([{ n, u, v }]), NOW_MS)
      return columns.value[0]
    }
    expect(await pressure('barometer', 'hPa', 1013.25)).toBe(101_325)
    expect(await pressure('vacuum', 'hPa', 338.64)).toBe(33_864)
    expect(await pressure('vacuum', 'kPa', 33.864)).toBe(33_864)
  })

  it('units that RFC 8428 section 12.1 rules out are not taken', async () => {
    for (const u of ['psi', 'Torr', 'atm', 'at', 'bar']) {
      const columns = await parseSenml(JSON.stringify([{ n: 'vacuum', u, v: 5 }]), NOW_MS)
      expect(REASONS[columns.reason[0] ?? 0], u).toBe('unknown-unit')
    }
  })
})
