// Runs a TypeScript entry after making sure that the packages are there: with-dependencies.mjs FILE [ARGUMENTS…]
import { existsSync } from 'node:fs'
import path from 'node:path'
import { pathToFileURL } from 'node:url'
import { ensureDebianPackages, ensureDependencies, giveUp, registerTypeScript, ROOT } from './bootstrap.mjs'

const [, , entry, ...rest] = process.argv
if (entry === undefined) giveUp('name the file to run.')
process.chdir(ROOT)
if (existsSync(path.join(ROOT, '.env'))) process.loadEnvFile(path.join(ROOT, '.env'))
ensureDependencies()
if (!process.env.DATABASE_URL) ensureDebianPackages({ postgres: true })
process.argv = [process.argv[0], path.join(ROOT, entry), ...rest]
await registerTypeScript()
await import(pathToFileURL(path.join(ROOT, entry)).href)
