import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseSenml } from '@/ingest/parse-senml'
import type { RecordColumns } from '@/ingest/records'
import { SenmlResolver } from '@/ingest/resolve-senml'
import { scanSenml } from '@/ingest/scan-senml'
import { times } from '@/tests/support/long'

const NOW_MS = 1_760_000_000_123

const plain = (columns: RecordColumns) => ({
  names: columns.names,
  ...Object.fromEntries(
    (['index', 'at', 'relative', 'channel', 'value', 'reason', 'name'] as const).map((column) => [
      column,
      Array.from(columns[column].subarray(0, columns.count)),
    ]),
  ),
})

/** A null, which the quick reader does not take, sends the same pack the slow way. */
const theSlowWay = (text: string) => parseSenml(text.replace('{', '{"x":null,'), NOW_MS)

const number = fc.oneof(
  fc.double({ noNaN: true, noDefaultInfinity: true }),
  fc.integer(),
  fc.integer({ min: 0, max: 4_000_000_000 }).map((n) => n / 1000),
)
const record = fc.record(
  {
    bn: fc.constantFrom('urn:dev:mw:SALT-1:', '', 'x/'),
    bt: number,
    bv: number,
    bu: fc.constantFrom('Pa', 'Cel'),
    bver: fc.constant(10),
    n: fc.oneof(fc.constantFrom('vacuum', 'pump', 'air', 'barometer', 'supply', 'bilge'), fc.string()),
    u: fc.constantFrom('Pa', 'kPa', 'hPa', 'Cel', 'V', 'psi'),
    v: number,
    vb: fc.boolean(),
    vs: fc.string(),
    t: number,
    note: fc.oneof(fc.string(), fc.boolean()),
  },
  { requiredKeys: [] },
)
const pack = fc.array(record, { minLength: 1, maxLength: 8 })

describe('the quick reader of plain packs', () => {
  it('resolves every pack as JSON.parse would have it', async () => {
    await fc.assert(
      fc.asyncProperty(pack, fc.constantFrom(undefined, 1, '\t'), async (records, indent) => {
        // The forced null is a field of the first record's own, so that record must have one already.
        const text = JSON.stringify([{ note: 'x', ...records[0] }, ...records.slice(1)], null, indent)
        expect(plain(await parseSenml(text, NOW_MS))).toEqual(plain(await theSlowWay(text)))
      }),
      { numRuns: times(500) },
    )
  })

  it('takes nothing that JSON.parse refuses', async () => {
    const damaged = fc.tuple(
      pack,
      fc.nat(),
      fc.nat(3),
      fc.constantFrom('"', ',', '}', '0', '.', '-', ' ', '\\', 'e', '\n', ']'),
    )
    await fc.assert(
      fc.asyncProperty(damaged, async ([records, place, cut, put]) => {
        const whole = JSON.stringify(records)
        const at = place % (whole.length + 1)
        const text = whole.slice(0, at) + put + whole.slice(at + cut)
        const resolver = new SenmlResolver(NOW_MS)
        const taken = await scanSenml(text, resolver).catch(() => false)
        if (taken) expect(Array.isArray(JSON.parse(text))).toBe(true)
      }),
      { numRuns: times(2_000) },
    )
  })

  it('goes the quick way for what loggers send', async () => {
    for (const text of [
      '[]',
      ' [ {"bn":"urn:dev:mw:A-1:","bt":1700000000.5,"n":"vacuum","u":"Pa","v":-30000.1} , {"n":"pump","vb":true} ]\n',
      '[{"n":"air","u":"Cel","v":1.5e1,"t":1700000000000.1234567}]',
    ])
      expect(await scanSenml(text, new SenmlResolver(NOW_MS)), text).toBe(true)
  })

  it('leaves escapes, nulls, nesting and broken ends to JSON.parse', async () => {
    for (const text of [
      '',
      '[',
      '[{}',
      '[{}]x',
      '[{"n":"a\\u0062"}]',
      '[{"n":null}]',
      '[{"n":[1]}]',
      '[01]',
      '[{"v":01}]',
      '[{"v":1.}]',
      '[{"v":.5}]',
    ])
      expect(await scanSenml(text, new SenmlResolver(NOW_MS)), text).toBe(false)
  })
})
