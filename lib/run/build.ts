import { spawn } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import path from 'node:path'

const SOURCES = ['app', 'components', 'ingest', 'lib', 'db', 'shared', 'public']
const FILES = [
  'package-lock.json',
  'next.config.ts',
  'postcss.config.mjs',
  'tsconfig.json',
  'proxy.ts',
  'instrumentation.ts',
]

/**
 * Builds the pages unless what stands in `.next` was made from the same sources.
 * @param options.onBuild told when a build is needed, before it begins.
 * @param options.signal ends a build that is under way.
 * @returns whether a build was needed.
 * @throws Error with the end of the build's output when it fails.
 */
export async function ensureBuild(
  root: string,
  options: { onBuild?: () => void; signal?: AbortSignal } = {},
): Promise<boolean> {
  const wanted = fingerprint(root)
  const stamp = path.join(root, '.next', 'middlewatch-build')
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) return false
  options.onBuild?.()
  const output = await run(root, options.signal)
  if (output.code !== 0) throw new Error(`the pages could not be built:\n${output.text.slice(-4000)}`)
  writeFileSync(stamp, wanted)
  return true
}

function fingerprint(root: string): string {
  const hash = createHash('sha256')
  for (const folder of SOURCES) {
    const names = existsSync(path.join(root, folder))
      ? (readdirSync(path.join(root, folder), { recursive: true }) as string[]).sort()
      : []
    for (const name of names) {
      const file = path.join(root, folder, name)
      if (path.extname(name) !== '') hash.update(`${folder}/${name}\0`).update(readIfFile(file))
    }
  }
  for (const name of FILES) hash.update(`${name}\0`).update(readIfFile(path.join(root, name)))
  return hash.digest('hex')
}

function readIfFile(file: string): Buffer {
  try {
    return readFileSync(file)
  } catch {
    return Buffer.alloc(0)
  }
}

function run(root: string, signal?: AbortSignal): Promise<{ code: number | null; text: string }> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['node_modules/next/dist/bin/next', 'build'], {
      cwd: root,
      env: { ...process.env, NODE_ENV: 'production', NEXT_TELEMETRY_DISABLED: '1' },
      stdio: ['ignore', 'pipe', 'pipe'],
      ...(signal === undefined ? {} : { signal }),
    })
    let text = ''
    child.stdout.on('data', (chunk: Buffer) => (text += chunk.toString()))
    child.stderr.on('data', (chunk: Buffer) => (text += chunk.toString()))
    child.once('error', reject)
    child.once('close', (code) => resolve({ code, text }))
  })
}
