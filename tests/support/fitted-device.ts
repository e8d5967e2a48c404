import type { IngestAnswer } from '@/shared/schemas'
import { toSenml } from '@/simulator/senml'
import { serverUrl } from './client'

export interface DeviceSample {
  at: number
  vacuumPa: number | null
  pumpOn: boolean | null
  airC?: number | null
  supplyV?: number | null
}

const form = async (path: string, fields: Record<string, string>, headers: Record<string, string>) => {
  const answer = await fetch(`${serverUrl()}${path}`, {
    method: 'POST',
    headers,
    body: new URLSearchParams(fields),
  })
  return { status: answer.status, body: (await answer.json()) as Record<string, unknown> }
}

/** A logger at the end of a line, as the server sees one: asks to be claimed, polls for its key, sends samples. */
export class Device {
  key = ''
  userCode = ''
  private deviceCode = ''

  constructor(
    readonly serial: string,
    /** The test's clock, epoch milliseconds; null = the real one. */
    readonly clock: () => number | null = () => null,
  ) {}

  private headers(): Record<string, string> {
    const at = this.clock()
    return at === null ? {} : { 'x-now': new Date(at).toISOString() }
  }

  /** RFC 8628 3.1. Answers the address that it would show as a QR code. */
  async askToBeClaimed(): Promise<string> {
    const { body } = await form('/api/device_authorization', { client_id: this.serial }, this.headers())
    this.deviceCode = String(body.device_code)
    this.userCode = String(body.user_code)
    return String(body.verification_uri_complete)
  }

  /** RFC 8628 3.4: one poll; the error it was answered, or null once it has its key. */
  async poll(): Promise<string | null> {
    const grant = 'urn:ietf:params:oauth:grant-type:device_code'
    const fields = { grant_type: grant, device_code: this.deviceCode, client_id: this.serial }
    const { status, body } = await form('/api/token', fields, this.headers())
    if (status !== 200) return String(body.error)
    this.key = String(body.access_token)
    return null
  }

  async send(samples: readonly DeviceSample[]): Promise<IngestAnswer> {
    const full = samples.map((sample) => ({ airC: null, supplyV: null, barometerPa: null, ...sample }))
    const answer = await fetch(`${serverUrl()}/api/ingest`, {
      method: 'POST',
      headers: {
        ...this.headers(),
        authorization: `Bearer ${this.key}`,
        'content-type': 'application/senml+json',
      },
      body: toSenml(this.serial, full),
    })
    if (answer.status !== 200)
      throw new Error(`the upload was answered ${answer.status}: ${await answer.text()}`)
    return (await answer.json()) as IngestAnswer
  }
}
