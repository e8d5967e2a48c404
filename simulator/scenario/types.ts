import type { Channel } from '@/simulator/logger'
import type { BoatSpec } from '@/simulator/spec'
import type { ScenarioGaugeTest, ScenarioPart } from './plant'

export type ShopKey = 'saltern' | 'stranger'
export type ScenarioShop = { key: ShopKey; name: string; harbour: string }
export type ScenarioPerson = {
  email: string
  name: string
  shop: ShopKey | null
  roles: ('manager' | 'technician' | 'installer')[]
}

export type ScenarioPartChange = {
  partKey: string
  at: number
  action: 'cleaned' | 'tightened' | 'adjusted' | 'replaced'
  detail: string
}
export type ScenarioVisit = {
  system: number
  complaint: string
  status: 'asked' | 'planned' | 'under-way' | 'proving' | 'closed'
  plannedFor: number | null
  startedAt: number | null
  finishedAt: number | null
  verdict: 'held' | 'better-under-limit' | 'no-change' | 'worse' | 'too-early' | null
  summary: string | null
  gaugeTests: ScenarioGaugeTest[]
  partChanges: ScenarioPartChange[]
}

export type ScenarioStatement =
  | { kind: 'aboard'; value: boolean; until: number | null }
  | { kind: 'system'; value: 'off' | 'laid-up' | 'worked-on'; until: number | null }

export type ScenarioSystem = {
  name: string
  kind: 'pass-through' | 'collecting' | 'unit' | 'two-pumps'
  parts: ScenarioPart[]
  pumpAmps: number
  lowSupplyV: number | null
  logger: { serial: string; channels: Channel[]; intervalSeconds: number }
  boat: BoatSpec
  statements: ScenarioStatement[]
}

export type ScenarioVessel = {
  name: string
  /** What it shows, for the log and for those who look for an example. */
  story: string
  berth: string
  harbour: string
  shop: ShopKey
  /** Null: the shop keeps it until an owner accepts. */
  ownerEmail: string | null
  /** Whether the owner lets the shop see the full record. */
  fullRecord: boolean
  systems: ScenarioSystem[]
  visits: ScenarioVisit[]
}

export type DemoScenario = {
  anchorMs: number
  timeZone: string
  offsetSeconds: number
  historyFromMs: number
  shops: ScenarioShop[]
  people: ScenarioPerson[]
  /** In the order in which they should appear: the leaking boat first. */
  vessels: ScenarioVessel[]
}
