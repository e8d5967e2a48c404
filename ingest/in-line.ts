const lines = new Map<string, Promise<unknown>>()

/**
 * Runs the work of one logger after its work before, in this process. Its uploads would wait for each other in the
 * database anyway, each holding a connection that other loggers could use.
 */
export function inLine<T>(loggerId: string, work: () => Promise<T>): Promise<T> {
  const before = lines.get(loggerId) ?? Promise.resolve()
  const mine = before.then(work)
  const settled = mine.then(
    () => undefined,
    () => undefined,
  )
  lines.set(loggerId, settled)
  void settled.then(() => {
    if (lines.get(loggerId) === settled) lines.delete(loggerId)
  })
  return mine
}
