import { ensureDebianPackages, ensureDependencies, registerTypeScript, ROOT } from './bootstrap.mjs'
import { existsSync } from 'node:fs'
import path from 'node:path'

process.chdir(ROOT)
if (existsSync(path.join(ROOT, '.env'))) process.loadEnvFile(path.join(ROOT, '.env'))
ensureDependencies()
if (!process.env.DATABASE_URL) ensureDebianPackages({ postgres: true })
await registerTypeScript()
const { serve } = await import('./serve.ts')
await serve()
