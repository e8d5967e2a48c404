import { logTicks } from '@/components/calculators/alignment'
import { formatDuration, fromPa, toPa, type VacuumUnit } from '@/shared/units'

const MINUTES = [15, 30, 45, 60]

/** The same as a table, for those who would rather look it up: hold time by what was lost and how long was waited. */
export function HoldTable({ differentialPa, unit }: { differentialPa: number; unit: VacuumUnit }) {
  const losses = logTicks(fromPa(toPa(0.05, 'inHg'), unit), fromPa(toPa(3, 'inHg'), unit))
  return (
    <table className="ruled max-w-[40em]">
      <caption className="datum pb-2 text-left">
        How long it holds, for {fromPa(differentialPa, unit).toPrecision(2)} {unit} between the pump’s stop
        and start. Three hours are the least, eight are wanted (common practice).
      </caption>
      <thead>
        <tr>
          <th scope="col">{unit} lost</th>
          {MINUTES.map((minutes) => (
            <th key={minutes} scope="col">
              in {minutes} min
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {losses.map((loss) => (
          <tr key={loss}>
            <th scope="row" className="figure">
              {loss}
            </th>
            {MINUTES.map((minutes) => {
              const seconds = (differentialPa * minutes * 60) / toPa(loss, unit)
              const weight =
                seconds < 10_800 ? 'text-attention' : seconds < 28_800 ? 'text-buff-ink' : 'text-sound'
              return (
                <td key={minutes} className={`figure ${weight}`}>
                  {formatDuration(seconds)}
                </td>
              )
            })}
          </tr>
        ))}
      </tbody>
    </table>
  )
}
