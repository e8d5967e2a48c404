import { spawn, type ChildProcess } from 'node:child_process'

interface Member {
  name: string
  child: ChildProcess
}

/** The processes that belong to one start: begun together, watched, and ended together. */
export interface Family {
  /**
   * Starts a member and, when it dies by itself, starts it again (after a pause that grows to 30 s).
   * @param ready resolves `begin` when a line of its output matches.
   */
  begin(name: string, args: string[], env: NodeJS.ProcessEnv, ready?: RegExp): Promise<void>
  pids(): number[]
  /** Asks all to end, last started first, and insists after ten seconds. */
  end(): Promise<void>
}

export function startFamily(root: string, onChange: () => void): Family {
  const members: Member[] = []
  let ending = false

  const launch = (
    name: string,
    args: string[],
    env: NodeJS.ProcessEnv,
    failures: number,
    onLine: (line: string) => void,
  ) => {
    const child = spawn(process.execPath, args, { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] })
    const member = { name, child }
    members.push(member)
    onChange()
    const startedAt = Date.now()
    const tell = (chunk: Buffer) => {
      for (const line of chunk.toString().split('\n')) {
        if (line.trim() === '') continue
        onLine(line)
        if (name !== 'web' || !/▲ Next|Local:|Network:|Ready in|Starting/.test(line))
          process.stdout.write(`${name.padEnd(9)} ${line}\n`)
      }
    }
    child.stdout?.on('data', tell)
    child.stderr?.on('data', tell)
    child.once('exit', (code, signal) => {
      members.splice(members.indexOf(member), 1)
      onChange()
      if (ending || (name === 'simulator' && code === 0)) return
      const again = Date.now() - startedAt > 60_000 ? 0 : failures + 1
      const pause = Math.min(30_000, 250 * 2 ** again)
      console.error(`${name} ended (${signal ?? code}); starting it again in ${pause / 1000} s`)
      setTimeout(() => {
        if (!ending) launch(name, args, env, again, onLine)
      }, pause)
    })
  }

  return {
    begin: (name, args, env, ready) =>
      new Promise((resolve, reject) => {
        if (ready === undefined) {
          launch(name, args, env, 0, () => {})
          resolve()
          return
        }
        const timer = setTimeout(() => reject(new Error(`${name} did not become ready within 60 s`)), 60_000)
        launch(name, args, env, 0, (line) => {
          if (!ready.test(line)) return
          clearTimeout(timer)
          resolve()
        })
      }),
    pids: () => members.flatMap(({ child }) => (child.pid === undefined ? [] : [child.pid])),
    end: async () => {
      ending = true
      for (const { child } of [...members].reverse()) {
        if (child.exitCode !== null || child.signalCode !== null) continue
        const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()))
        child.kill('SIGTERM')
        const insist = setTimeout(() => child.kill('SIGKILL'), 10_000)
        await gone
        clearTimeout(insist)
      }
    },
  }
}
