import { PA_PER_INHG } from '@/shared/units'
import { absent, isFresh, MARGIN, unclear, type Finding, type JudgedRecord } from '@/lib/notices/record'

const NARROWER_SHARE = 0.25
const NARROWER_PA = 0.4 * PA_PER_INHG
const OFF_SET_UP_PA = PA_PER_INHG
const FRESH_HOURS = 48

/** The switch's band narrower by a quarter or 0.4 inHg, or either point more than 1 inHg off its set-up. */
export function switchDrift(record: JudgedRecord): Finding {
  const { figures, settings } = record
  const { now, usual } = figures.signs
  const shares = [
    narrowing(now.differentialPa, usual.differentialPa),
    apart(figures.cutOutPa, settings.cutOutPa),
    apart(figures.cutInPa, settings.cutInPa),
  ]
  const worst = Math.max(...shares)
  if (worst > 1) {
    if (!isFresh(record, FRESH_HOURS)) return unclear
    return {
      is: 'present',
      severity: worst,
      reason:
        shares[0] === worst
          ? 'The switch starts and stops the pump closer together than usual'
          : 'The switch works more than 1 inHg off its set-up',
      evidence: {
        cutOutPa: figures.cutOutPa,
        cutInPa: figures.cutInPa,
        differentialPa: now.differentialPa,
        usualDifferentialPa: usual.differentialPa,
      },
    }
  }
  return worst <= 1 / MARGIN ? absent : unclear
}

/** How much narrower, as a share of what is allowed. */
function narrowing(nowPa: number | null, usualPa: number | null): number {
  if (nowPa === null || usualPa === null || usualPa <= 0) return 0
  return (usualPa - nowPa) / Math.min(NARROWER_PA, NARROWER_SHARE * usualPa)
}

const apart = (learnedPa: number | null, setPa: number | null): number =>
  learnedPa === null || setPa === null ? 0 : Math.abs(learnedPa - setPa) / OFF_SET_UP_PA
