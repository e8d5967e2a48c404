import { absent, isFresh, unclear, type Finding, type JudgedRecord } from '@/lib/notices/record'

const FRESH_HOURS = 2
const READINGS_NEEDED = 3
/** 15 % of a battery's voltage is all that lies between empty and full; 3 % is a margin. Common practice, no source. */
const SUPPLY_MARGIN = 1.03

/** Under the set figure all of the last half hour, pump off: a sag while it runs is as it should be. */
export function lowSupply(record: JudgedRecord): Finding {
  const { supply, settings } = record
  const lowV = settings.lowSupplyV
  if (lowV === null) return absent
  if (supply === null || supply.count < READINGS_NEEDED || !isFresh(record, FRESH_HOURS)) return unclear
  if (supply.highestV < lowV) {
    return {
      is: 'present',
      severity: lowV / Math.max(1, supply.highestV),
      reason: `${supply.highestV.toFixed(1)} V, under the set ${lowV.toFixed(1)} V`,
      evidence: { supplyV: supply.highestV, lowSupplyV: lowV },
    }
  }
  return supply.lowestV >= lowV * SUPPLY_MARGIN ? absent : unclear
}
