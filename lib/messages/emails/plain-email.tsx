import { Body, Container, Head, Heading, Html, Link, Preview, Text } from '@react-email/components'
import { render } from '@react-email/render'

interface PlainEmailProps {
  subject: string
  paragraphs: string[]
  action?: { label: string; url: string }
}

const INK = '#0f222c'

function PlainEmail({ subject, paragraphs, action }: PlainEmailProps) {
  return (
    <Html lang="en">
      <Head />
      <Preview>{paragraphs[0] ?? subject}</Preview>
      <Body
        style={{
          backgroundColor: '#ffffff',
          color: INK,
          fontFamily: 'Helvetica, Arial, sans-serif',
          margin: 0,
        }}
      >
        <Container style={{ maxWidth: 560, padding: '28px 20px' }}>
          <Heading
            as="h1"
            style={{ fontSize: 22, lineHeight: '1.25', borderTop: `1.5px solid ${INK}`, paddingTop: 12 }}
          >
            {subject}
          </Heading>
          {paragraphs.map((paragraph) => (
            <Text key={paragraph} style={{ fontSize: 16, lineHeight: '1.5', margin: '10px 0' }}>
              {paragraph}
            </Text>
          ))}
          {action === undefined ? null : (
            <Text style={{ fontSize: 16 }}>
              <Link href={action.url} style={{ color: '#0b4a66' }}>
                {action.label}
              </Link>
            </Text>
          )}
        </Container>
      </Body>
    </Html>
  )
}

/** A mail of a few sentences and at most one link, as HTML and as plain text. */
export async function plainEmail(mail: PlainEmailProps): Promise<{ html: string; text: string }> {
  const link = mail.action === undefined ? [] : [`${mail.action.label}: ${mail.action.url}`]
  return { html: await render(<PlainEmail {...mail} />), text: [...mail.paragraphs, ...link].join('\n\n') }
}
