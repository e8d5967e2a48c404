/** Demo and test show the demo accounts and the outbox; production never does. */
export function isDemo(): boolean {
  const mode = process.env.MODE ?? (process.env.DATABASE_URL ? 'production' : 'demo')
  return mode !== 'production'
}
