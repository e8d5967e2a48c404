/** The best test of all, with no tools: which bowl's seal lets the air in. */
export function CupTest() {
  return (
    <details className="mt-5">
      <summary>Find the bowl yourself: the cup test</summary>
      <ol className="mt-2 grid max-w-[38em] list-decimal gap-1.5 pl-5">
        <li>Flush nothing for half an hour, so that the leak shows by itself.</li>
        <li>Put a cup of water in one bowl only, and again flush nothing for half an hour.</li>
        <li>
          If the leak grows much smaller on this page, it was that bowl’s seal. If not, that bowl is cleared:
          flush it, and try the next.
        </li>
      </ol>
    </details>
  )
}
