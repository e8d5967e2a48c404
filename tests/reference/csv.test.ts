import { describe, expect, it } from 'vitest'
import { parseCsv, readTable } from '@/ingest/parse-csv'

/** RFC 4180 section 2: rules 1 to 5 as read in its text, 6 and 7 value from memory; recomputed with another reader. */
describe('RFC 4180 section 2', () => {
  const cases: [rule: string, text: string, rows: string[][]][] = [
    [
      '1, 2: the last line may end without a break',
      'aaa,bbb,ccc\r\nzzz,yyy,xxx',
      [
        ['aaa', 'bbb', 'ccc'],
        ['zzz', 'yyy', 'xxx'],
      ],
    ],
    [
      '1: or with one',
      'aaa,bbb,ccc\r\nzzz,yyy,xxx\r\n',
      [
        ['aaa', 'bbb', 'ccc'],
        ['zzz', 'yyy', 'xxx'],
      ],
    ],
    ['4: spaces are part of a field', ' a , b ', [[' a ', ' b ']]],
    [
      '5: fields may be quoted',
      '"aaa","bbb","ccc"\r\nzzz,yyy,xxx',
      [
        ['aaa', 'bbb', 'ccc'],
        ['zzz', 'yyy', 'xxx'],
      ],
    ],
    [
      '6: breaks within quotes',
      '"aaa","b\r\nbb","ccc"\r\nzzz,yyy,xxx',
      [
        ['aaa', 'b\r\nbb', 'ccc'],
        ['zzz', 'yyy', 'xxx'],
      ],
    ],
    ['6: commas within quotes', '"a,aa",b', [['a,aa', 'b']]],
    ['7: a quote is doubled', '""""', [['"']]],
    ['empty fields', ',,\r\n', [['', '', '']]],
    ['an empty quoted field', '"",x', [['', 'x']]],
    [
      'LF alone (not of the RFC)',
      'a,b\nc,d\n',
      [
        ['a', 'b'],
        ['c', 'd'],
      ],
    ],
    [
      'CR alone (not of the RFC)',
      'a,b\rc,d',
      [
        ['a', 'b'],
        ['c', 'd'],
      ],
    ],
    [
      'a blank line is passed over (our choice)',
      'a,b\r\n\r\n1,2',
      [
        ['a', 'b'],
        ['1', '2'],
      ],
    ],
  ]
  it.each(cases)('%s', (_rule, text, rows) => {
    expect(readTable(text)).toEqual(rows)
  })

  it('a quote that never closes is refused with its place', () => {
    expect(() => readTable('time,vacuum_pa\n"1700000000,30000')).toThrow(/line 2|Quote/)
  })

  it('a semicolon table with decimal commas (not of the RFC) is refused by its header', async () => {
    await expect(parseCsv('time;vacuum_pa\r\n1700000000;2,5')).rejects.toThrow(/no column "time"/)
  })
})
