import { dayOfDate } from '@/components/time'
import type { PumpDay } from '@/components/vessel/pump/pump-days'
import { formatDuration, UNKNOWN } from '@/shared/units'

/** Each day of the pump, newest first, with a bar as long as it ran. */
export function PumpDaysTable({ days }: { days: readonly PumpDay[] }) {
  const most = days.reduce((longest, day) => Math.max(longest, day.seconds), 1)
  return (
    <table className="ruled max-w-[60em]">
      <thead>
        <tr>
          <th scope="col">Day</th>
          <th scope="col">Runs</th>
          <th scope="col">By itself</th>
          <th scope="col">On for</th>
          <th scope="col">Ah</th>
          <th scope="col" className="hidden w-[38%] sm:table-cell">
            <span className="sr-only">Length</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {[...days].reverse().map((day) => (
          <tr key={day.date}>
            <td className="whitespace-nowrap">{dayOfDate(day.date)}</td>
            <td className="figure">{day.runs}</td>
            <td className="figure">{day.byItself}</td>
            <td className="figure whitespace-nowrap">{formatDuration(day.seconds)}</td>
            <td className="figure">{day.ampHours === null ? UNKNOWN : day.ampHours.toFixed(1)}</td>
            <td className="hidden align-middle! sm:table-cell">
              <span className="block h-2 bg-act" style={{ width: `${(day.seconds / most) * 100}%` }} />
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}
