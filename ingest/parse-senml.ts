import type { RecordColumns } from '@/ingest/records'
import { SenmlResolver, type SenmlFields } from '@/ingest/resolve-senml'
import { scanSenml } from '@/ingest/scan-senml'
import { Problem } from '@/lib/problem'

const BASE_FIELDS = new Set(['bn', 'bt', 'bu', 'bv', 'bver', 'bs'])

/**
 * Resolves a SenML pack (RFC 8428, JSON) into entries.
 * @param body the pack as text.
 * @param receiptMs epoch milliseconds of receipt: what relative times count from.
 * @throws Problem `not-parseable` with the place, when it is not a pack that may be understood.
 * @example (await parseSenml('[{"n":"x:vacuum","u":"kPa","v":30,"t":1700000000}]', 0)).value[0] // 30000
 */
export async function parseSenml(body: string, receiptMs: number): Promise<RecordColumns> {
  const quick = new SenmlResolver(receiptMs)
  if (await scanSenml(body, quick)) return quick.columns
  const resolver = new SenmlResolver(receiptMs)
  readPack(body).forEach((record, index) => {
    const own = lookAtFields(record, index)
    resolver.take(record, index, own)
  })
  return resolver.columns
}

function readPack(body: string): SenmlFields[] {
  let pack: unknown
  try {
    pack = JSON.parse(body)
  } catch (error) {
    const where = error instanceof Error ? error.message : 'unknown place'
    throw new Problem('not-parseable', `The body is not JSON: ${where}. Send one SenML pack (RFC 8428).`)
  }
  if (!Array.isArray(pack))
    throw new Problem(
      'not-parseable',
      'The body is JSON but not an array: a SenML pack is an array of records.',
    )
  pack.forEach((record: unknown, index) => {
    if (typeof record !== 'object' || record === null || Array.isArray(record))
      throw refused(index, 'is not an object')
  })
  return pack as SenmlFields[] // every one is an object, and every field of the type may be anything
}

const refused = (index: number, what: string): Problem =>
  new Problem('not-parseable', `Record ${index} (counted from 0) ${what}.`, { extensions: { index } })

/**
 * @returns whether the record has any field besides base fields.
 * @throws Problem for a field that must be understood (RFC 8428 section 4.4) and is not known here.
 */
function lookAtFields(record: SenmlFields, index: number): boolean {
  let own = false
  for (const key in record) {
    if (key.endsWith('_'))
      throw refused(index, `has the field "${key}", which must be understood and is not known here`)
    if (!BASE_FIELDS.has(key)) own = true
  }
  return own
}
