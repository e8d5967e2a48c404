/** What the one server of a test run is, and where its neighbours listen. */
export interface TestSettings {
  url: string
  port: number
  /** The maintenance database, for making and dropping clones. */
  adminUrl: string
  /** The database the server uses; shared by all files, so tests keep to vessels of their own. */
  databaseUrl: string
  smtpPort: number
  smsPort: number
}

export const SMS_TOKEN = 'token-of-the-fake-in-tests'
export const DEMO_PASSWORD = 'middle-watch-demo'

/** The environment of every process in a test run. */
export function testEnvironment(settings: TestSettings): Record<string, string> {
  return {
    MODE: 'test',
    DATABASE_URL: settings.databaseUrl,
    PORT: String(settings.port),
    APP_URL: settings.url,
    NEXTAUTH_URL: settings.url,
    NEXTAUTH_SECRET: 'secret-of-a-test-run-and-nothing-else',
    AUTH_TRUST_HOST: '1',
    DEMO_PASSWORD,
    SMTP_URL: `smtp://127.0.0.1:${settings.smtpPort}`,
    MAIL_FROM: 'Middlewatch <watch@middlewatch.example>',
    TWILIO_API_URL: `http://127.0.0.1:${settings.smsPort}`,
    TWILIO_ACCOUNT_SID: `AC${'0'.repeat(32)}`,
    TWILIO_AUTH_TOKEN: SMS_TOKEN,
    TWILIO_FROM: '+12025550100',
    LOG_LEVEL: 'warn',
  }
}
