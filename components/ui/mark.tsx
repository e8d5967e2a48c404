/** The mark: a crescent over a level line in a dark disc. The watch, and a needle that does not move. */
export function Mark({ size = 24 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 24 24" aria-hidden="true" className="shrink-0">
      <circle cx="12" cy="12" r="11.2" fill="#13303f" stroke="var(--field)" strokeWidth="0.8" />
      <path d="M3.2 16h17.6" stroke="#fff" strokeWidth="1.7" />
      <path d="M15.4 4.6a5.3 5.3 0 1 0 2.6 7.9 6.2 6.2 0 0 1-2.6-7.9z" fill="#fff" />
    </svg>
  )
}
