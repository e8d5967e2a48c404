import {
  Body,
  Container,
  Head,
  Heading,
  Hr,
  Html,
  Link,
  Preview,
  Section,
  Text,
} from '@react-email/components'
import { NightStrip, NightStripHours, stripText } from '@/lib/messages/emails/night-strip'
import type { Wording } from '@/lib/messages/wording'

export interface BoatWords {
  boat: string
  /** Address of the boat's page. */
  url: string
  wording: Wording
}

export interface NoticeEmailProps {
  boats: BoatWords[]
  /** Where the link in the message leads: shows, and lets one acknowledge, mute or ask for a visit. */
  actUrl: string
  settingsUrl: string
  greeting: string
}

const INK = '#0f222c'
const INK_2 = '#465a66'
const ACT = '#0b4a66'
const text = { color: INK, fontSize: 16, lineHeight: '1.5', margin: '8px 0' }
const note = { color: INK_2, fontSize: 14, lineHeight: '1.45', margin: '6px 0' }

/** One mail about one boat or several: finding first, then how sure, what to do, and where to look. */
export function NoticeEmail({ boats, actUrl, settingsUrl, greeting }: NoticeEmailProps) {
  return (
    <Html lang="en">
      <Head />
      <Preview>
        {boats
          .map((boat) => `${boat.boat}: ${boat.wording.finding}`)
          .join(' ')
          .slice(0, 140)}
      </Preview>
      <Body
        style={{
          backgroundColor: '#ffffff',
          color: INK,
          fontFamily: 'Helvetica, Arial, sans-serif',
          margin: 0,
        }}
      >
        <Container style={{ maxWidth: 560, padding: '28px 20px' }}>
          <Text style={note}>{greeting}</Text>
          {boats.map((boat, index) => (
            <Boat key={index} boat={boat} />
          ))}
          <Text style={{ ...text, marginTop: 20 }}>
            <Link href={actUrl} style={{ color: ACT }}>
              Acknowledge, mute, or ask for a visit
            </Link>
          </Text>
          <Hr style={{ borderColor: '#cfdae0', margin: '24px 0 12px' }} />
          <Text style={note}>
            Middlewatch measures; it does not certify, and is no substitute for a bilge or gas alarm. Times
            are the boat’s own.{' '}
            <Link href={settingsUrl} style={{ color: ACT }}>
              What you are told, and how
            </Link>
          </Text>
        </Container>
      </Body>
    </Html>
  )
}

function Boat({ boat }: { boat: BoatWords }) {
  const { wording } = boat
  return (
    <Section style={{ borderTop: `1.5px solid ${INK}`, marginTop: 14, paddingTop: 10 }}>
      <Heading as="h1" style={{ fontSize: 22, lineHeight: '1.25', margin: '4px 0 6px', color: INK }}>
        {boat.boat}
      </Heading>
      <Text style={{ ...text, fontSize: 18 }}>{wording.finding}</Text>
      {wording.strip === null ? null : (
        <>
          <NightStrip strip={wording.strip} />
          <NightStripHours />
          <Text style={note}>{stripText(wording.strip)}</Text>
        </>
      )}
      {wording.sureness === null ? null : <Text style={note}>{wording.sureness}</Text>}
      {wording.steps.length === 0 ? null : (
        <ol style={{ paddingLeft: 22, margin: '10px 0' }}>
          {wording.steps.map((step) => (
            <li key={step} style={{ ...text, margin: '4px 0' }}>
              {step}
            </li>
          ))}
        </ol>
      )}
      {wording.caution === null ? null : (
        <Text style={{ ...text, borderLeft: '3px solid #6b4e00', paddingLeft: 10 }}>{wording.caution}</Text>
      )}
      <Text style={note}>
        <Link href={boat.url} style={{ color: ACT }}>
          The record of {boat.boat}
        </Link>
      </Text>
    </Section>
  )
}
