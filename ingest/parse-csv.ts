import { parse } from 'csv-parse/sync'
import { NO_CHANNEL, RecordColumns, reasonCode, roundTime, takeValue } from '@/ingest/records'
import { Problem } from '@/lib/problem'

/** Header words in the order of CHANNELS. */
const HEADERS = ['pump', 'vacuum_pa', 'air_cel', 'barometer_pa', 'supply_v'] as const
const HEADER_SENTENCE = `The first line names the columns: time and any of ${HEADERS.join(', ')}, in any order.`

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/
/** RFC 3339 section 5.6: the zone is not optional. */
const RFC3339 = /^\d{4}-\d{2}-\d{2}[Tt ]\d{2}:\d{2}:\d{2}(\.\d+)?([Zz]|[+-]\d{2}:\d{2})$/

/** So many rows are read in one go before other requests get their turn. */
const ROWS_A_TURN = 20_000

/**
 * Takes a table (RFC 4180) apart into entries, one a filled cell. Lines may end in CRLF, LF or CR.
 * @param body the table as text, first line its header.
 * @throws Problem `not-parseable` with the line, when the quotes do not close or the header is not understood.
 * @example (await parseCsv('time,vacuum_pa\n1700000000,30000')).value[0] // 30000
 */
export async function parseCsv(body: string): Promise<RecordColumns> {
  const columns = new RecordColumns()
  let header: Header | undefined
  let row = 0
  for (const cells of rowsOf(body)) {
    if (header === undefined) {
      header = readHeader(cells)
      continue
    }
    takeRow(cells, row, header, columns)
    row += 1
    if (row % ROWS_A_TURN === 0) await new Promise((resolve) => setImmediate(resolve))
  }
  if (header === undefined) throw new Problem('not-parseable', `The table is empty. ${HEADER_SENTENCE}`)
  return columns
}

/** Loggers quote nothing, and then a table is lines and commas; a table with quotes is read by the library. */
function rowsOf(body: string): Iterable<string[]> {
  return body.includes('"') || /\r(?!\n)/.test(body) ? readTable(body) : plainRows(body)
}

function* plainRows(body: string): Generator<string[]> {
  const start = body.startsWith('\ufeff') ? 1 : 0
  for (let from = start; from < body.length;) {
    const newline = body.indexOf('\n', from)
    const end = newline === -1 ? body.length : newline
    const line = body.slice(from, end > from && body[end - 1] === '\r' ? end - 1 : end)
    if (line !== '') yield line.split(',')
    from = end + 1
  }
}

/** The cells of a table (RFC 4180 section 2), row by row; blank lines left out.
 * @throws Problem `not-parseable` with the line */
export function readTable(body: string): string[][] {
  try {
    return parse(body, {
      bom: true,
      relax_column_count: true,
      skip_empty_lines: true,
      record_delimiter: ['\r\n', '\n', '\r'],
    })
  } catch (error) {
    const where = error instanceof Error ? error.message : 'unknown place'
    throw new Problem('not-parseable', `The table could not be read: ${where}.`)
  }
}

interface Header {
  width: number
  timeColumn: number
  /** Position in CHANNELS by column; -1 = none. */
  channelOf: number[]
}

function readHeader(header: string[]): Header {
  const words = header.map((cell) => cell.trim().toLowerCase())
  const timeColumn = words.indexOf('time')
  const channelOf = words.map((word) => HEADERS.findIndex((known) => known === word))
  if (timeColumn === -1) throw new Problem('not-parseable', `There is no column "time". ${HEADER_SENTENCE}`)
  if (new Set(words).size !== words.length)
    throw new Problem('not-parseable', `A column is named twice. ${HEADER_SENTENCE}`)
  if (words.length === 1)
    throw new Problem('not-parseable', `There is no column but time. ${HEADER_SENTENCE}`)
  return { width: words.length, timeColumn, channelOf }
}

function takeRow(
  cells: string[],
  row: number,
  { width, timeColumn, channelOf }: Header,
  columns: RecordColumns,
): void {
  const at = readTime(cells[timeColumn] ?? '')
  const fits = cells.length === width && Number.isFinite(at)
  let filled = 0
  if (fits)
    for (let column = 0; column < width; column += 1) {
      const cell = cells[column]?.trim() ?? ''
      if (column === timeColumn || cell === '') continue
      filled += 1
      const channel = channelOf[column] ?? -1
      if (channel === -1) {
        columns.push(row, at, false, NO_CHANNEL, NaN, reasonCode('unknown-channel'))
        continue
      }
      const { value, reason } = readCell(channel, cell)
      columns.push(row, at, false, channel, value, reason)
    }
  // A row that measures nothing is named rather than passed over in silence.
  if (filled === 0) columns.push(row, fits ? at : NaN, false, NO_CHANNEL, NaN, reasonCode('bad-value'))
}

function readCell(channel: number, cell: string): { value: number; reason: number } {
  if (channel === 0) {
    const word = cell.toLowerCase()
    if (word === '1' || word === 'true') return { value: 1, reason: 0 }
    if (word === '0' || word === 'false') return { value: 0, reason: 0 }
    return { value: NaN, reason: reasonCode('bad-value') }
  }
  return takeValue(channel, NUMBER.test(cell) ? Number(cell) : NaN)
}

/** @returns epoch milliseconds of RFC 3339 text or epoch seconds; NaN when it is neither. */
export function readTime(cell: string): number {
  const text = cell.trim()
  if (NUMBER.test(text)) return roundTime(Number(text) * 1000)
  if (!RFC3339.test(text)) return NaN
  return parseRfc3339(text)
}

function parseRfc3339(text: string): number {
  const [, year, month, day, clock = '', fraction = '', zone = ''] =
    /^(\d{4})-(\d{2})-(\d{2})[Tt ](\d{2}:\d{2}:\d{2})(\.\d+)?(.+)$/.exec(text) ?? []
  const whole = Date.parse(`${year}-${month}-${day}T${clock}${zone.toUpperCase()}`)
  // Date.parse lets the 30th of February pass as the 1st or 2nd of March.
  const local = Date.parse(`${year}-${month}-${day}T00:00:00Z`)
  if (new Date(local).getUTCDate() !== Number(day)) return NaN
  return roundTime(whole + Number(`0${fraction}`) * 1000)
}
