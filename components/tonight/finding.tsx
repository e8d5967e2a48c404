import type { Phrase } from '@/components/tonight/phrases'

const STRONG = { attention: 'font-bold text-attention', ink: 'font-bold' }

/** A finding in words, its telling part set strong. */
export function Finding({ phrases }: { phrases: readonly Phrase[] }) {
  return (
    <>
      {phrases.map((phrase, index) =>
        phrase.strong ? (
          <strong key={index} className={STRONG[phrase.strong]}>
            {phrase.text}
          </strong>
        ) : (
          <span key={index}>{phrase.text}</span>
        ),
      )}
    </>
  )
}
