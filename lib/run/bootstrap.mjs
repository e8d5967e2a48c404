// Plain JavaScript, no packages: this runs before anything is installed.
import { spawnSync } from 'node:child_process'
import { createHash } from 'node:crypto'
import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs'
import path from 'node:path'

export const ROOT = path.resolve(import.meta.dirname, '../..')

/** Ends the process with one clear sentence. */
export function giveUp(sentence) {
  console.error(`\nMiddlewatch: ${sentence}`)
  process.exit(1)
}

/** Installs the packages that package-lock.json names, unless they already are. */
export function ensureDependencies() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 19))
    giveUp(`Node.js 20.19 or newer is needed; this is ${process.versions.node}.`)
  const lock = readFileSync(path.join(ROOT, 'package-lock.json'))
  const wanted = createHash('sha256').update(lock).digest('hex')
  const stamp = path.join(ROOT, 'node_modules', '.middlewatch-lock')
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) return
  console.log('Installing packages …')
  const done = spawnSync('npm', ['ci', '--no-audit', '--no-fund', '--include=dev'], {
    cwd: ROOT,
    stdio: 'inherit',
  })
  if (done.status !== 0)
    giveUp('the packages could not be installed; see above. The npm registry must be reachable.')
  writeFileSync(stamp, wanted)
}

const isRoot = () => process.getuid?.() === 0
const hasPostgres = () =>
  existsSync('/usr/lib/postgresql') &&
  readdirSync('/usr/lib/postgresql').some(
    (v) => Number(v) >= 15 && existsSync(`/usr/lib/postgresql/${v}/bin/initdb`),
  )
/** Nights are counted by the operating system's zone rules; those of before 2026 are an hour wrong in places. */
const hasZones = () => {
  try {
    return (
      Number(readFileSync('/usr/share/zoneinfo/tzdata.zi', 'utf8').match(/^# version (\d{4})/)?.[1]) >= 2026
    )
  } catch {
    return false
  }
}
const hasChromium = () => existsSync('/usr/bin/chromium')

/**
 * Installs what is missing from Debian's packages when root, else says what to install.
 * @param {{ postgres?: boolean, chromium?: boolean }} wanted
 */
export function ensureDebianPackages(wanted) {
  const oldZones = wanted.postgres && !hasZones()
  const missing = [
    ...(wanted.postgres && !hasPostgres() ? ['postgresql'] : []),
    ...(wanted.chromium && !hasChromium() ? ['chromium'] : []),
  ]
  if (missing.length === 0 && !oldZones) return
  if (missing.length === 0 && !isRoot()) {
    console.warn('The time zone data are older than 2026; update them with: apt-get install tzdata')
    return
  }
  const packages = [...missing, ...(oldZones ? ['tzdata'] : [])]
  const command = `apt-get install -y ${packages.join(' ')}`
  if (!isRoot()) giveUp(`${missing.join(' and ')} must be installed first, by an administrator: ${command}`)
  console.log(`Installing ${packages.join(' and ')} from Debian's packages …`)
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  const quiet = { env, stdio: ['ignore', 'ignore', 'inherit'] }
  spawnSync('apt-get', ['update', '-qq'], quiet)
  const done = spawnSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...packages], quiet)
  if (done.status !== 0) giveUp(`Debian's packages could not be installed; try: ${command}`)
  // Debian starts a server of its own at installation; ours is private and needs none beside it.
  if (missing.includes('postgresql')) spawnSync('pg_ctlcluster', ['15', 'main', 'stop'], { stdio: 'ignore' })
}

/** Lets this process import TypeScript. */
export async function registerTypeScript() {
  const { register } = await import('tsx/esm/api')
  register()
}
