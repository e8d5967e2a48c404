import { defineConfig, globalIgnores } from 'eslint/config'
import nextVitals from 'eslint-config-next/core-web-vitals'
import nextTypescript from 'eslint-config-next/typescript'

const room = (name) => [`@/${name}`, `@/${name}/**`, `**/../${name}/**`]

/** What a folder may not import: the third column of the architecture, stated as its complement. */
const keepOut = (files, forbidden, extra = []) => ({
  files,
  rules: {
    'no-restricted-imports': [
      'error',
      {
        patterns: [
          {
            group: forbidden.flatMap(room).concat(extra),
            message: 'This folder may not reach into that one: see the table of folders in DEVELOPERS.md.',
          },
        ],
      },
    ],
  },
})

const ROOMS = ['app', 'components', 'ingest', 'lib', 'db', 'simulator', 'tests']
const allBut = (...allowed) => ROOMS.filter((name) => !allowed.includes(name))

export default defineConfig([
  ...nextVitals,
  ...nextTypescript,
  {
    rules: {
      '@typescript-eslint/no-explicit-any': 'error',
      '@typescript-eslint/no-non-null-assertion': 'error',
      '@typescript-eslint/no-unused-vars': ['error', { argsIgnorePattern: '^_' }],
    },
  },
  keepOut(['app/**'], allBut('app', 'components', 'lib', 'ingest'), ['knex', 'pg']),
  keepOut(['components/**'], allBut('components'), ['knex', 'pg']),
  keepOut(['ingest/**'], allBut('ingest', 'lib', 'db'), ['@/lib/run/**', '@/lib/auth/**']),
  keepOut(['lib/**'], allBut('lib', 'db')),
  keepOut(['lib/analysis/**'], allBut('lib'), [
    '@/lib/[b-z]**',
    '@/lib/access/**',
    '@/lib/auth/**',
    'node:*',
    'next',
    'next/**',
    'react',
    'knex',
    'pg',
  ]),
  keepOut(['db/**'], allBut('db')),
  keepOut(['shared/**'], ROOMS),
  keepOut(['simulator/**'], allBut('simulator')),
  // The commands start and join the rooms; they are the only place allowed to see all of them.
  {
    files: ['lib/run/**', 'lib/analysis/**/*.test.ts', 'tests/**'],
    rules: { 'no-restricted-imports': 'off' },
  },
  globalIgnores(['.next/**', '.data/**', 'node_modules/**', 'next-env.d.ts', 'coverage/**']),
])
