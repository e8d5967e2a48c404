import type { NextConfig } from 'next'

const config: NextConfig = {
  // Knex probes for every database driver it knows; left outside the bundle it only loads the one we use.
  serverExternalPackages: ['knex', 'pg', 'pg-boss', '@node-rs/argon2', 'pino', 'twilio', 'nodemailer'],
  poweredByHeader: false,
  reactStrictMode: true,
  devIndicators: false,
  // For files that are served as they lie; pages and handlers set more, and their own.
  headers: async () => [
    { source: '/:path*', headers: [{ key: 'x-content-type-options', value: 'nosniff' }] },
  ],
  // Types are checked by the tests; a start need not wait for it.
  typescript: { ignoreBuildErrors: true },
}

export default config
