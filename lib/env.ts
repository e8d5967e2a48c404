import { z } from 'zod'

/** Known to everybody who reads the code: good enough for a demo, refused in production. */
const DEFAULT_SECRET = 'middlewatch-demo-secret-known-to-all'
const DEFAULT_DEMO_PASSWORD = 'middle-watch-demo'

const text = z.string().trim().min(1)
const optionalText = z.preprocess((value) => (value === '' ? undefined : value), text.optional())

const variablesSchema = z.object({
  MODE: z.preprocess(
    (value) => (value === '' ? undefined : value),
    z.enum(['demo', 'test', 'production']).optional(),
  ),
  DATABASE_URL: optionalText,
  PORT: z.coerce.number().int().min(1).max(65_535).default(3000),
  APP_URL: z.preprocess((value) => (value === '' ? undefined : value), z.url().optional()),
  NEXTAUTH_SECRET: optionalText,
  AUTH_TRUST_HOST: optionalText,
  DEMO_PASSWORD: text.default(DEFAULT_DEMO_PASSWORD),
  SMTP_URL: optionalText,
  SMTP_HOST: optionalText,
  SMTP_PORT: z.coerce.number().int().min(1).max(65_535).default(587),
  SMTP_USER: optionalText,
  SMTP_PASS: optionalText,
  MAIL_FROM: text.default('Middlewatch <watch@middlewatch.example>'),
  TWILIO_ACCOUNT_SID: optionalText,
  TWILIO_AUTH_TOKEN: optionalText,
  TWILIO_FROM: optionalText,
  TWILIO_API_URL: z.preprocess((value) => (value === '' ? undefined : value), z.url().optional()),
  SIMULATOR: z.enum(['on', 'off']).default('on'),
  RETENTION_DAYS: z.coerce.number().int().min(400).default(400),
  LOG_LEVEL: z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info'),
})

export type Mode = 'demo' | 'test' | 'production'

export interface Environment {
  mode: Mode
  /** Undefined only in the demo before its private server has been started. */
  databaseUrl: string | undefined
  port: number
  /** Where people reach the application, without a slash at its end. */
  appUrl: string
  secret: string
  trustHost: boolean
  demoPassword: string
  smtp: {
    /** Stands before host and port when given. */
    url: string | undefined
    host: string | undefined
    port: number
    user: string | undefined
    pass: string | undefined
    from: string
  }
  sms: {
    accountSid: string | undefined
    authToken: string | undefined
    from: string | undefined
    /** Address of a stand-in that speaks the service's protocol. */
    apiUrl: string | undefined
  }
  simulator: boolean
  retentionDays: number
  logLevel: 'fatal' | 'error' | 'warn' | 'info' | 'debug' | 'trace' | 'silent'
}

/**
 * Reads and checks the environment. MODE is `demo` without DATABASE_URL, `production` with one, unless it is said.
 * @throws Error naming every variable that is wrong; in production also for a missing or default secret.
 */
export function readEnvironment(source: Readonly<Record<string, string | undefined>>): Environment {
  const parsed = variablesSchema.safeParse(source)
  if (!parsed.success) {
    const wrong = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`)
    throw new Error(`The environment is not right. ${wrong.join('; ')}`)
  }
  const variables = parsed.data
  const mode = variables.MODE ?? (variables.DATABASE_URL === undefined ? 'demo' : 'production')
  if (mode === 'production') refuseDefaults(variables)
  return {
    mode,
    databaseUrl: variables.DATABASE_URL,
    port: variables.PORT,
    appUrl: (variables.APP_URL ?? `http://127.0.0.1:${variables.PORT}`).replace(/\/+$/, ''),
    secret: variables.NEXTAUTH_SECRET ?? DEFAULT_SECRET,
    trustHost: variables.AUTH_TRUST_HOST !== undefined && variables.AUTH_TRUST_HOST !== '0',
    demoPassword: variables.DEMO_PASSWORD,
    smtp: {
      url: variables.SMTP_URL,
      host: variables.SMTP_HOST,
      port: variables.SMTP_PORT,
      user: variables.SMTP_USER,
      pass: variables.SMTP_PASS,
      from: variables.MAIL_FROM,
    },
    sms: {
      accountSid: variables.TWILIO_ACCOUNT_SID,
      authToken: variables.TWILIO_AUTH_TOKEN,
      from: variables.TWILIO_FROM,
      apiUrl: variables.TWILIO_API_URL,
    },
    simulator: variables.SIMULATOR === 'on',
    retentionDays: variables.RETENTION_DAYS,
    logLevel: variables.LOG_LEVEL,
  }
}

function refuseDefaults(variables: z.infer<typeof variablesSchema>): void {
  const wrong: string[] = []
  const secret = variables.NEXTAUTH_SECRET
  if (secret === undefined || secret === DEFAULT_SECRET || secret.length < 32)
    wrong.push('NEXTAUTH_SECRET must be set to at least 32 characters of your own (openssl rand -hex 32)')
  if (variables.DATABASE_URL === undefined) wrong.push('DATABASE_URL must be set')
  if (variables.APP_URL === undefined) wrong.push('APP_URL must be set to the address people use')
  if (variables.TWILIO_API_URL !== undefined) wrong.push('TWILIO_API_URL is for demo and tests only')
  if (wrong.length > 0) throw new Error(`Production does not start like this. ${wrong.join('; ')}`)
}

const held = globalThis as { middlewatchEnvironment?: { of: string; value: Environment } }

/** The process's environment, checked once; read again when a test points it elsewhere. */
export function env(): Environment {
  const of = `${process.env.DATABASE_URL}|${process.env.MODE}|${process.env.APP_URL}|${process.env.SMTP_URL}`
  if (held.middlewatchEnvironment?.of !== of)
    held.middlewatchEnvironment = { of, value: readEnvironment(process.env) }
  return held.middlewatchEnvironment.value
}

/** The present of a request: in tests the `x-now` header may say when that is. */
export function now(request: { headers: Headers }): Date {
  if (env().mode === 'test') {
    const said = request.headers.get('x-now')
    const at = said === null ? Number.NaN : Date.parse(said)
    if (Number.isFinite(at)) return new Date(at)
  }
  return new Date()
}
