import { formatVacuum, fromPa, type VacuumUnit } from '@/shared/units'
import type { Summary } from '@/shared/schemas'

/**
 * Where the vacuum stands between the pump's start and its stop: a level line with the two marks of the switch,
 * as a pressure gauge is read.
 */
export function VacuumBand({ summary, unit }: { summary: Summary; unit: VacuumUnit }) {
  const { cutInPa, cutOutPa, current } = summary
  const vacuum = current?.vacuumPa ?? null
  if (cutInPa === null || cutOutPa === null || vacuum === null || cutOutPa <= cutInPa) return null
  const spread = cutOutPa - cutInPa
  const [low, high] = [cutInPa - spread * 0.6, cutOutPa + spread * 0.3]
  const place = (pa: number) => Math.min(100, Math.max(0, ((pa - low) / (high - low)) * 100))
  const figure = (pa: number) => fromPa(pa, unit).toFixed(unit === 'mbar' ? 0 : 1)
  return (
    <div
      className="relative h-16 max-w-[38em]"
      role="img"
      aria-label={`Vacuum ${formatVacuum(vacuum, unit)}; the pump starts at ${formatVacuum(cutInPa, unit)} and stops at ${formatVacuum(cutOutPa, unit)}`}
    >
      <span className="absolute inset-x-0 top-6 h-px bg-ink" />
      <span
        className="absolute top-[19px] h-[11px] bg-shoal"
        style={{ left: `${place(cutInPa)}%`, width: `${place(cutOutPa) - place(cutInPa)}%` }}
      />
      {[
        { pa: cutInPa, word: 'starts' },
        { pa: cutOutPa, word: 'stops' },
      ].map(({ pa, word }) => (
        <span
          key={word}
          className="absolute top-4 h-[17px] w-[1.5px] bg-ink"
          style={{ left: `${place(pa)}%` }}
        >
          <span className="datum absolute top-[20px] -translate-x-1/2 whitespace-nowrap">
            {word} <span className="figure">{figure(pa)}</span>
          </span>
        </span>
      ))}
      <span className="absolute top-0 -translate-x-1/2 font-semibold" style={{ left: `${place(vacuum)}%` }}>
        <svg
          width="14"
          height="24"
          viewBox="0 0 14 24"
          aria-hidden="true"
          className={current?.pumpOn ? 'live' : ''}
        >
          <path d="M7 24L1 4h12z" fill="var(--act)" />
        </svg>
      </span>
    </div>
  )
}
