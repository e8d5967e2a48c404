import { freeze } from '@/lib/notices/kinds/freeze'
import { lowSupply } from '@/lib/notices/kinds/low-supply'
import { noStart } from '@/lib/notices/kinds/no-start'
import { runningOn } from '@/lib/notices/kinds/running-on'
import { sensorFault } from '@/lib/notices/kinds/sensor-fault'
import { shortCycling } from '@/lib/notices/kinds/short-cycling'
import { shortHold } from '@/lib/notices/kinds/short-hold'
import { slowRecharge } from '@/lib/notices/kinds/slow-recharge'
import { switchDrift } from '@/lib/notices/kinds/switch-drift'
import type { Finding, JudgedKind, JudgedRecord } from '@/lib/notices/record'

/** One pure function a kind. */
export const KINDS: Record<JudgedKind, (record: JudgedRecord) => Finding> = {
  'sensor-fault': sensorFault,
  'running-on': runningOn,
  'no-start': noStart,
  'short-cycling': shortCycling,
  'short-hold': shortHold,
  'slow-recharge': slowRecharge,
  'switch-drift': switchDrift,
  'low-supply': lowSupply,
  freeze,
}
