import { mean } from './leg-scales'
import type { RunRow } from '../fold/types'
import type { SignatureFinding, SignatureInput, Suspect } from './types'

const CHANGED = { rate: 1.3, recharge: 1.2, differential: 0.75 }
/** A pump loses about this share of its speed with each share of voltage; half of it counts as explained. */
const VOLTAGE_FELL = 0.04

/**
 * Rate r, recharge R, differential D and K = r/(R + r), now against usual: r up with R the same, a leak; R down,
 * the pump (or its supply, where the voltage fell with it); r and R up with K the same, the gas space shrank; r up
 * and R down, a suction check valve; D down, the switch. Without a usual to compare with: not enough.
 */
export function signsTogether({ figures, runs, at }: SignatureInput): SignatureFinding {
  const signature = 'signs-together' as const
  const { now, usual } = figures.signs
  const factor = (a: number | null, b: number | null) => (a === null || b === null || b <= 0 ? null : a / b)
  const rate = factor(now.ratePaPerSecond, usual.ratePaPerSecond)
  const recharge = factor(now.rechargePaPerSecond, usual.rechargePaPerSecond)
  const differential = factor(now.differentialPa, usual.differentialPa)
  const ratio = factor(now.ratio, usual.ratio)
  if (rate === null && recharge === null && differential === null) {
    return { signature, enough: false, missing: 'a day of runs to compare with the days before' }
  }
  const rateUp = rate !== null && rate > CHANGED.rate
  const rechargeUp = recharge !== null && recharge > CHANGED.recharge
  const rechargeDown = recharge !== null && recharge < 1 / CHANGED.recharge
  const suspects: Suspect[] = []
  const add = (family: Suspect['family'], strength: number, basis: string, overturnedBy: string) =>
    suspects.push({ family, strength, basis, overturnedBy })
  const figuresText = `leak × ${text(rate)}, recharge × ${text(recharge)}, differential × ${text(differential)}`
  if (differential !== null && differential < CHANGED.differential && !rateUp) {
    add('switch', 5, figuresText, 'a hand gauge that shows the points where they were')
  }
  if (rateUp && rechargeUp && ratio !== null && Math.abs(Math.log(ratio)) < 0.2) {
    add(
      'gas-space',
      5,
      `${figuresText}: both by the gas space alone`,
      'the same after the tank is pumped out',
    )
  } else if (rateUp && rechargeDown) {
    add(
      'check-valve',
      4,
      `${figuresText}: the pump moves less and lets air back`,
      'a plug in the pump’s inlet that holds',
    )
  } else if (rechargeDown && voltsFell(runs, at)) {
    add('supply', 4, `${figuresText}, and the supply fell with it`, 'the same recharge at full voltage')
  } else if (rechargeDown) {
    add('pump', 4, figuresText, 'a blocked discharge or vent that was cleared')
  }
  return { signature, enough: true, suspects }
}

const text = (factor: number | null): string => (factor === null ? '–' : factor.toFixed(2))

function voltsFell(runs: readonly RunRow[], at: number): boolean {
  const volts = (wanted: (run: RunRow) => boolean) => runs.filter(wanted).flatMap((run) => run.supplyV ?? [])
  const now = volts((run) => run.stoppedAt > at - 86_400_000)
  const before = volts((run) => run.stoppedAt <= at - 86_400_000)
  return now.length >= 3 && before.length >= 3 && mean(now) < (1 - VOLTAGE_FELL) * mean(before)
}
