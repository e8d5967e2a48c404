/** Drawn with table cells, since mail programs show neither SVG nor fonts of ours: 48 cells of 20 minutes, 18:00 to 10:00. */
const CELLS = 48
const CELL_MINUTES = 20
const COLOURS = { twilight: '#e6f0f4', quiet: '#13303f', run: '#ff5fb4', runOutside: '#a50f68' }

type Strip = { quiet: [number, number]; expected: number[] }

/** What the strip shows, in words, for those who cannot see it. */
export function stripText(strip: Strip): string {
  const times = strip.expected.map(clockOfMinute)
  if (times.length === 0) return 'Tonight, 18:00 to 10:00, quiet hours dark.'
  return `Tonight, 18:00 to 10:00, quiet hours dark. Runs to expect at about ${times.slice(0, 12).join(', ')}.`
}

const clockOfMinute = (minute: number): string => {
  const clock = Math.round(minute + 18 * 60)
  return `${String(Math.floor(clock / 60) % 24).padStart(2, '0')}:${String(clock % 60).padStart(2, '0')}`
}

export function NightStrip({ strip }: { strip: Strip }) {
  const cells = Array.from({ length: CELLS }, (_, index) => {
    const from = index * CELL_MINUTES
    const middle = from + CELL_MINUTES / 2
    const quiet = middle >= strip.quiet[0] && middle < strip.quiet[1]
    const run = strip.expected.some((minute) => minute >= from && minute < from + CELL_MINUTES)
    return { quiet, run }
  })
  return (
    <table
      role="img"
      aria-label={stripText(strip)}
      width="100%"
      cellPadding={0}
      cellSpacing={0}
      border={0}
      style={{ borderCollapse: 'collapse', tableLayout: 'fixed', margin: '18px 0 4px' }}
    >
      <tbody>
        <tr>
          {cells.map((cell, index) => (
            <td
              key={index}
              style={{
                height: 34,
                padding: 0,
                fontSize: 1,
                lineHeight: '1px',
                backgroundColor: cell.quiet ? COLOURS.quiet : COLOURS.twilight,
                borderLeft: cell.run
                  ? `3px solid ${cell.quiet ? COLOURS.run : COLOURS.runOutside}`
                  : undefined,
              }}
            >
              &nbsp;
            </td>
          ))}
        </tr>
      </tbody>
    </table>
  )
}

/** The hours beneath the strip. */
export function NightStripHours() {
  return (
    <table width="100%" cellPadding={0} cellSpacing={0} border={0} style={{ tableLayout: 'fixed' }}>
      <tbody>
        <tr>
          {['18:00', '22:00', '02:00', '06:00'].map((hour) => (
            <td key={hour} style={{ fontSize: 12, color: '#465a66' }}>
              {hour}
            </td>
          ))}
        </tr>
      </tbody>
    </table>
  )
}
