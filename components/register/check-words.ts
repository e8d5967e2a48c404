import { OUTCOME_TITLES } from '@/shared/commissioning-words'
import type { CheckKind, CheckOutcome } from '@/shared/schemas'

export interface CheckWords {
  /** Why it is done, in a sentence. */
  why: string
  /** In the order of the work. */
  how: string[]
  caution: string | null
  begin: string
  done: string
}

const BREAKER =
  'Losing vacuum starts the pump. Put it off at its own breaker and tag it, shore power and inverter too; never a breaker that feeds a bilge pump.'

export const CHECK_WORDS: Record<CheckKind, CheckWords> = {
  'first-reading': {
    why: 'Shows that the logger has power, a signal where it will live, its key, and every channel it is meant to measure.',
    how: [
      'Power the logger from a supply of its own that stays on, fused.',
      'Close the hatch as it will be at sea, and wait for the first reading.',
    ],
    caution: null,
    begin: 'Look for readings',
    done: 'Check what arrived',
  },
  'leak-down-before': {
    why: 'What the boat leaks before anything is cut, so that nobody has to argue later whether the tee did it.',
    how: [
      'Water off, and everybody aboard told: nobody flushes.',
      'Let the pump draw down to its cut-out, then put its breaker off.',
      'Wait a minute for it to settle, read the gauge, wait, read again. 30 minutes are a test.',
    ],
    caution: `${BREAKER} Ventilate: sewage gas kills, and the nose stops smelling it. Gloves and eyes; cuts covered.`,
    begin: 'Begin',
    done: 'Enter the readings',
  },
  zero: {
    why: 'Open to the air the sensor must read nought. What it is off by is taken off in the next step.',
    how: [
      'Leave the sensor’s hose off the tee, its port open to the air, dry and out of any draught.',
      'Begin, and leave it alone for a few readings.',
    ],
    caution: null,
    begin: 'The port is open: begin',
    done: 'Check the readings',
  },
  'two-point': {
    why: 'The logger beside a hand gauge at cut-out: with the nought it makes two points, which set offset and gain.',
    how: [
      'Fit the tee and connect the sensor. Breaker on again, and let the pump draw down until it stops by itself.',
      'Wait a minute, tap the gauge, read it while nobody flushes, and enter what it says.',
    ],
    caution: `Before the tee is cut in: ${BREAKER} Vent the vacuum first, expect liquid from raised and discharge hoses, and shut the seacock before a hose below the waterline opens. Gloves, eyes; ventilate. Before the pump runs again: discharge open, seacocks as found.`,
    begin: 'Begin',
    done: 'Compare the two',
  },
  'pump-channel': {
    why: 'One flush shows that the logger sees the pump start and stop, and the vacuum rise with it.',
    how: ['Begin, then flush one bowl.', 'Wait until the pump has stopped, and a reading or two longer.'],
    caution: null,
    begin: 'Begin, then flush once',
    done: 'It has stopped: check',
  },
  'breaker-off': {
    why: 'Shows that the breaker is the pump’s, and that the logger goes on when it is off.',
    how: [
      'Put the pump’s breaker off and tag it.',
      'Begin, then flush until the gauge is an inch or more under where the pump would start.',
      'Leave it for two minutes.',
    ],
    caution:
      'Off and tagged before you flush; tell the crew. Never a breaker that feeds a bilge pump. A breaker that is marked wrongly shows here: keep hands off the pump until this has passed.',
    begin: 'It is off and tagged: begin',
    done: 'Check it',
  },
  'leak-down-after': {
    why: 'The logger’s own leak-down beside the one by hand shows whether the tee leaks.',
    how: [
      'Breaker on, let the pump draw down to its cut-out, then breaker off and tag it again.',
      'Begin, and let nobody flush. The logger is the gauge: some 15 to 30 minutes tell.',
    ],
    caution: `${BREAKER} At the end: breaker on, water on, the pump stopped at cut-out, each head flushed, no drips.`,
    begin: 'Breaker is off: begin',
    done: 'Judge it now',
  },
}

export const OUTCOME_WORDS: Record<CheckOutcome | 'under-way' | 'open', string> = {
  ...OUTCOME_TITLES,
  'under-way': 'Under way',
  open: 'To do',
}
