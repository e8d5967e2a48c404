import type { TestPoint } from '@/shared/schemas'

const capital = (text: string): string => `${text.charAt(0).toUpperCase()}${text.slice(1)}`

/** The parts in a test in few words: what it leaves out, where that is shorter than what it takes in. */
export function inTestWords(parts: readonly string[], names: ReadonlyMap<string, string>): string {
  const said = (keys: readonly string[]) => keys.map((key) => names.get(key) ?? key).join(', ')
  const left = [...names.keys()].filter((key) => !parts.includes(key))
  if (left.length === 0) return 'everything'
  return left.length < parts.length ? `all but ${said(left)}` : said(parts)
}

/** Where the system can be tested, and which parts each test has in it. */
export function TestPoints({
  points,
  names,
  chosen,
  choose,
}: {
  points: readonly TestPoint[]
  names: ReadonlyMap<string, string>
  chosen: number | null
  choose: (index: number | null) => void
}) {
  if (points.length === 0)
    return (
      <p className="text-ink-2">
        This kind of system holds no standing vacuum, so there is no place to test it.
      </p>
    )
  return (
    <div>
      <h3>Test points</h3>
      <p className="mb-2 text-ink-2">
        They follow from the drawing. Choose one to see in the drawing what is in its test.
      </p>
      <ul className="border-t border-line">
        {points.map((point, index) => {
          const at = point.at === null ? '' : `: ${names.get(point.at) ?? point.at}`
          return (
            <li key={`${point.kind} ${point.at ?? ''}`} className="border-b border-line">
              <button
                type="button"
                aria-pressed={chosen === index}
                onClick={() => choose(chosen === index ? null : index)}
                className="grid min-h-11 w-full gap-x-6 py-2 text-left aria-pressed:bg-shallow sm:grid-cols-[minmax(0,1fr)_minmax(0,1fr)]"
              >
                <span>
                  <span className="font-semibold underline decoration-1 underline-offset-4">
                    {capital(point.what)}
                    {at}
                  </span>
                  <span className="datum block">
                    drawn by {point.drawnBy}, {point.minutes} min
                    {point.switchSees ? '' : ', the switch does not see it'}
                  </span>
                </span>
                <span className="break-words">In the test: {inTestWords(point.parts, names)}</span>
              </button>
            </li>
          )
        })}
      </ul>
    </div>
  )
}
