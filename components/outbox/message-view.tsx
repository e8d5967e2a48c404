import type { Outbox } from '@/shared/schemas'

/** One message as its receiver sees it: a text as its characters, an e-mail drawn in a frame that can do nothing. */
export function MessageView({ message }: { message: Outbox['items'][number] }) {
  return (
    <article aria-label="The message">
      <p className="datum">
        {message.channel === 'sms'
          ? `Text to ${message.to}, ${message.text.length} characters`
          : `E-mail to ${message.to}`}
      </p>
      {message.subject ? <h2 className="mb-3">{message.subject}</h2> : null}
      {message.channel === 'sms' || message.html === null ? (
        <p className="mt-3 max-w-[26em] rounded-sm border border-field px-4 py-3 text-lead whitespace-pre-wrap">
          {message.text}
        </p>
      ) : (
        <>
          <iframe
            title={message.subject ?? 'E-mail'}
            sandbox=""
            srcDoc={message.html}
            className="h-[70vh] w-full border border-line bg-[#fff]"
          />
          <details className="mt-3">
            <summary>As plain text</summary>
            <pre className="figure mt-2 whitespace-pre-wrap">{message.text}</pre>
          </details>
        </>
      )}
    </article>
  )
}
