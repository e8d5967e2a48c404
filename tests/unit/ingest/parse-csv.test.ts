import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseCsv } from '@/ingest/parse-csv'
import { REASONS, type RecordColumns } from '@/ingest/records'
import { times } from '@/tests/support/long'

const plain = (columns: RecordColumns) =>
  Array.from({ length: columns.count }, (_, i) => ({
    index: columns.index[i],
    at: columns.at[i],
    channel: columns.channel[i],
    value: columns.value[i],
    reason: REASONS[columns.reason[i] ?? 0],
  }))

const cell = fc.constantFrom(
  '',
  '1',
  '0',
  'true',
  'false',
  '30000.04',
  '-12.5',
  'x',
  ' 7 ',
  '1e3',
  '1700000000',
  'NaN',
)
const table = fc.array(fc.array(cell, { minLength: 5, maxLength: 6 }), { maxLength: 12 })

describe('parseCsv', () => {
  it('reads a plain table as it reads one with quotes, whatever ends its lines', async () => {
    await fc.assert(
      fc.asyncProperty(table, fc.constantFrom('\n', '\r\n'), fc.boolean(), async (rows, end, open) => {
        const all = [['pump', 'time', 'vacuum_pa', 'air_cel', 'supply_v'], ...rows]
        const text = all.map((cells) => cells.join(',')).join(end) + (open ? '' : end)
        const quoted = all.map((cells) => cells.map((word) => `"${word}"`).join(',')).join(end)
        expect(plain(await parseCsv(text))).toEqual(plain(await parseCsv(quoted)))
      }),
      { numRuns: times(300) },
    )
  })

  it('names a row that measures nothing, has cells too many or too few, or no time', async () => {
    const columns = await parseCsv(
      '\ufefftime,vacuum_pa\n1700000000,\n1700000001,1,2\n1700000002\nsoon,3\n\n1700000003,30000\n',
    )
    expect(plain(columns).map(({ index, reason, value }) => [index, reason, value])).toEqual([
      [0, 'bad-value', NaN],
      [1, 'bad-value', NaN],
      [2, 'bad-value', NaN],
      [3, 'bad-value', NaN],
      [4, null, 30_000],
    ])
  })

  it.each([
    ['', /empty/],
    ['vacuum_pa,pump\n1,2', /no column "time"/],
    ['time\n1700000000', /no column but time/],
    ['time,pump,pump\n1,0,1', /named twice/],
    ['time,"vacuum_pa\n1,2', /could not be read/],
  ])('refuses %j', async (text, message) => {
    await expect(parseCsv(text)).rejects.toThrow(message)
  })
})
