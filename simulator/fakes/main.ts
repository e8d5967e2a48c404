import { startMailFake } from './mail'
import { startSmsFake } from './sms'

/** Both services for a demo, on the ports of SMTP_PORT and SMS_PORT, until told to end. */
async function main(): Promise<void> {
  const mail = await startMailFake({ port: Number(process.env.SMTP_PORT ?? 0) })
  const sms = await startSmsFake({
    port: Number(process.env.SMS_PORT ?? 0),
    authToken: process.env.TWILIO_AUTH_TOKEN ?? 'demo-token-of-the-local-fake',
    callbackDelayMs: 1500,
  })
  console.log(`mail and SMS fakes ready on 127.0.0.1:${mail.port} and 127.0.0.1:${sms.port}`)
  const end = () => {
    void Promise.all([mail.stop(), sms.stop()]).then(() => process.exit(0))
  }
  process.once('SIGTERM', end)
  process.once('SIGINT', end)
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : String(error))
  process.exit(1)
})
