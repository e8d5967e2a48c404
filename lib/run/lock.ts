import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import path from 'node:path'

interface LockContent {
  pid: number
  children: number[]
}

/** One start at a time in a folder; a lock left by a start that died is taken over and its children ended. */
export interface Lock {
  remember(children: number[]): void
  release(): void
}

/** @throws Error when another start is alive in this folder. */
export function takeLock(folder: string): Lock {
  mkdirSync(folder, { recursive: true })
  const file = path.join(folder, 'start.lock')
  if (existsSync(file)) {
    const left = readLock(file)
    if (left !== null && left.pid !== process.pid && isOurs(left.pid, 'start.mjs')) {
      throw new Error(`it already runs here (process ${left.pid}); stop that one first.`)
    }
    for (const pid of left?.children ?? []) if (isOurs(pid, 'node')) process.kill(pid, 'SIGKILL')
  }
  const write = (content: LockContent) => writeFileSync(file, JSON.stringify(content))
  write({ pid: process.pid, children: [] })
  return {
    remember: (children) => write({ pid: process.pid, children }),
    release: () => rmSync(file, { force: true }),
  }
}

function readLock(file: string): LockContent | null {
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as LockContent
  } catch {
    return null
  }
}

/** A process number is reused after a while: only one whose command line fits is the one remembered. */
function isOurs(pid: number, word: string): boolean {
  try {
    return readFileSync(`/proc/${pid}/cmdline`, 'utf8').includes(word)
  } catch {
    return false
  }
}
