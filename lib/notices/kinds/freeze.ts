import { absent, isRecent, unclear, type Finding, type JudgedRecord } from '@/lib/notices/record'

const BELOW_C = 3
const OVER_C = 4
const FRESH_HOURS = 6

/** Under 3 °C by the pump; over at 4 °C. */
export function freeze({ air, now }: JudgedRecord): Finding {
  if (air === null || !isRecent(air.at, now, FRESH_HOURS)) return unclear
  if (air.airC < BELOW_C) {
    return {
      is: 'present',
      // Degrees under 5 °C: told again when it is half as far again.
      severity: 5 - air.airC,
      reason: `${air.airC.toFixed(0)} °C by the pump`,
      evidence: { airC: air.airC },
    }
  }
  return air.airC >= OVER_C ? absent : unclear
}
