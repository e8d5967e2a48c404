import type { Trx } from '@/db/roles'

/** Runs one statement of the limiter's library, unnamed, so that a transaction pooler may stand between. */
export async function runThrottleStatement(
  trx: Trx,
  statement: { text: string; values?: unknown[] },
): Promise<unknown> {
  const connection: unknown = await trx.client.acquireConnection()
  if (!canQuery(connection)) throw new Error('the pool gave no connection')
  return connection.query({ text: statement.text, values: statement.values })
}

interface Connection {
  query(statement: { text: string; values: unknown[] | undefined }): Promise<unknown>
}
const canQuery = (value: unknown): value is Connection =>
  typeof value === 'object' && value !== null && 'query' in value
