import { supplyFinding, type SupplyBin } from '@/components/vessel/pump/supply-bins'
import { formatDuration, vacuumFigure, type VacuumUnit } from '@/shared/units'

/** Recharge by supply voltage; nothing where no supply was measured. */
export function SupplyTable({ bins, unit }: { bins: readonly SupplyBin[]; unit: VacuumUnit }) {
  if (bins.length === 0) return null
  return (
    <section aria-labelledby="supply-title">
      <h2 id="supply-title" className="mt-8 mb-2">
        By supply voltage
      </h2>
      <p className="mb-2 text-ink-2">{supplyFinding(bins)}</p>
      <table className="ruled max-w-[38em]">
        <thead>
          <tr>
            <th scope="col">Supply while it ran</th>
            <th scope="col">Runs by itself</th>
            <th scope="col">Recharge, {unit}/s</th>
            <th scope="col">On for</th>
          </tr>
        </thead>
        <tbody>
          {bins.map((bin) => (
            <tr key={bin.lowV}>
              <th scope="row" className="figure whitespace-nowrap">
                {bin.lowV.toFixed(1)} to {bin.highV.toFixed(1)} V
              </th>
              <td className="figure">{bin.runs}</td>
              <td className="figure">{vacuumFigure(bin.rechargePaPerSecond, unit, 3)}</td>
              <td className="figure whitespace-nowrap">{formatDuration(bin.seconds)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  )
}
