import { INHG } from './constants'
import { interrupt } from './interrupt'
import { closeLeg } from './leg'
import type { FoldState } from './state'
import type { Fact, Row } from './types'

/** Puts a dated fact in force. */
export function applyFact(state: FoldState, fact: Fact, rows: Row[]): void {
  switch (fact.kind) {
    case 'settings':
      if (fact.settings.kind !== state.settings.kind) interrupt(state, fact.at, rows)
      state.settings = { ...fact.settings }
      return
    case 'fitting':
      fitLogger(state, fact, rows)
      return
    case 'removal':
      interrupt(state, fact.at, rows)
      state.fitting = null
      return
    case 'statement':
      applyStatement(state, fact, rows)
  }
}

/** Another logger has its own channels, rhythm and noise; what the system has taught stays. */
function fitLogger(state: FoldState, fact: Extract<Fact, { kind: 'fitting' }>, rows: Row[]): void {
  if (state.fitting?.loggerId !== fact.loggerId) {
    interrupt(state, fact.at, rows)
    state.channels.pumpOn = null
    state.channels.pumpAt = null
    state.sigmaPa = 0.005 * INHG
    state.stepPa = 0
    state.rhythmAt = null
    state.recordsEdges = false
  }
  state.fitting = {
    loggerId: fact.loggerId,
    at: fact.at,
    intervalSeconds: fact.intervalSeconds,
    pump: fact.channels.pump,
    vacuum: fact.channels.vacuum,
  }
}

/** What people said. Legs are cut at it, so that none is partly set aside. */
function applyStatement(state: FoldState, fact: Extract<Fact, { kind: 'statement' }>, rows: Row[]): void {
  closeLeg(state, fact.at, rows)
  if (fact.value === 'off') {
    interrupt(state, fact.at, rows)
    state.offSince ??= fact.at
  } else if (state.statement?.value === 'off') state.offSince = null
  state.statement = fact.value === null ? null : { value: fact.value, since: fact.at }
  if (fact.value !== null && state.hold !== null) state.hold.setAside = true
  if (fact.value !== null && state.run !== null) state.run.setAside = true
}
