import { Button } from '@/components/ui/button'
import { Field } from '@/components/ui/field'
import type { TypedSpan } from '@/components/vessel/record/compare-spans'

/** One side of a comparison: typed, or taken from the stretch that the trace shows. */
export function CompareSide({
  title,
  span,
  trouble,
  change,
  takeShown,
}: {
  title: string
  span: TypedSpan
  trouble: string | null
  change: (span: TypedSpan) => void
  /** Null where no trace is shown. */
  takeShown: (() => void) | null
}) {
  const isTyped = span.from !== '' && span.to !== ''
  return (
    <fieldset className="grid content-start gap-2">
      <legend className="mb-1 font-semibold">{title}</legend>
      <div className="grid gap-3 sm:grid-cols-2">
        <Field
          label="From"
          type="datetime-local"
          value={span.from}
          onChange={(event) => change({ ...span, from: event.target.value })}
        />
        <Field
          label="To"
          type="datetime-local"
          value={span.to}
          error={isTyped && trouble !== null ? trouble : undefined}
          onChange={(event) => change({ ...span, to: event.target.value })}
        />
      </div>
      {takeShown ? (
        <div>
          <Button weight="plain" onClick={takeShown}>
            Take the stretch that the trace shows
          </Button>
        </div>
      ) : null}
    </fieldset>
  )
}
