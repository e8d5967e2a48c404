// Everything on a fresh clone: packages, lint, types, format, and all tests; ends with the count alone on a line.
import { spawn } from 'node:child_process'
import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import path from 'node:path'
import { ensureDebianPackages, ensureDependencies, ROOT } from './bootstrap.mjs'

process.chdir(ROOT)
ensureDependencies()
ensureDebianPackages({ postgres: true, chromium: true })

const long = process.argv.includes('--long')
const only = process.argv.slice(2).filter((argument) => !argument.startsWith('--'))
let passed = 0
let failed = 0

const run = (args, env = {}) =>
  new Promise((resolve) => {
    const child = spawn(process.execPath, args, { stdio: 'inherit', env: { ...process.env, ...env } })
    for (const signal of ['SIGTERM', 'SIGINT']) process.once(signal, () => child.kill(signal))
    child.once('exit', (code) => resolve(code ?? 1))
  })

const check = async (name, args) => {
  const startedAt = Date.now()
  const code = await run(args)
  console.log(`${code === 0 ? 'ok' : 'FAILED'}  ${name} (${Math.round((Date.now() - startedAt) / 1000)} s)`)
  if (code === 0) passed += 1
  else failed += 1
}

if (only.length === 0) {
  // The route types that Next writes are part of the program, so they come before the types.
  const types = run(['node_modules/next/dist/bin/next', 'typegen']).then(() =>
    check('types', ['node_modules/typescript/bin/tsc', '--noEmit']),
  )
  await check('format', ['node_modules/prettier/bin/prettier.cjs', '--check', '--log-level', 'warn', '.'])
  await check('lint', ['node_modules/eslint/bin/eslint.js', '.', '--max-warnings', '0'])
  await types
}

mkdirSync('.data', { recursive: true })
const report = path.join(ROOT, '.data', 'test-report.json')
rmSync(report, { force: true })
// Migrations are loaded by Knex, outside the test runner's own loader.
const code = await run(
  [
    '--import',
    'tsx',
    'node_modules/vitest/vitest.mjs',
    'run',
    '--reporter=default',
    '--reporter=json',
    `--outputFile.json=${report}`,
    ...only,
  ],
  long ? { LONG: '1' } : {},
)
if (existsSync(report)) {
  const result = JSON.parse(readFileSync(report, 'utf8'))
  passed += result.numPassedTests
  failed += result.numFailedTests
  // A file that does not even load fails without a test that does.
  const broken = result.testResults.filter(
    (file) => file.status === 'failed' && file.assertionResults.length === 0,
  )
  failed += broken.length
}
if (code !== 0 && failed === 0) failed = 1
console.log(`\n${passed} passed, ${failed} failed`)
process.exit(failed === 0 ? 0 : 1)
