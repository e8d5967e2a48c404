import type { SuspectFamily, Suspects } from '@/shared/schemas'

/** A suspect as a technician reads it: what it is, what to ask aboard, what to do first, what to have in the bag. */
export interface FamilyWords {
  name: string
  ask: string | null
  first: string
  bring: string[]
}

export const FAMILY_WORDS: Record<SuspectFamily, FamilyWords> = {
  'bowl-valve': {
    name: 'A bowl valve that seats differently each time',
    ask: 'Which head was flushed last before the bad nights?',
    first: 'Clean the valve and its seat and look for grit, then flush and listen.',
    bring: ['bowl seals'],
  },
  'bowl-seal': {
    name: 'A bowl seal that dries out',
    ask: 'Which head is used least, and does a cup of water in it help?',
    first: 'Wet the bowls one by one and watch the leak; clean the seal before replacing it.',
    bring: ['bowl seals', 'base gaskets'],
  },
  'check-valve': {
    name: 'A check valve that does not seat after a run',
    ask: 'Has the pump been opened or serviced lately?',
    first: 'Clean the valves and their seats; they are the first routine replacement.',
    bring: ['check valves', 'diaphragm'],
  },
  'fixed-fitting': {
    name: 'A fixed fitting, hose, tank or switch connection',
    ask: 'Has anything been stowed on, moved or tightened near the tank and hoses?',
    first: 'Tighten clamps and fittings by hand tool, gently, one at a time, with the gauge in sight.',
    bring: ['hose clamps', 'tank fitting seals', 'plugs and caps'],
  },
  'hose-or-clamp': {
    name: 'A hose or clamp that moves or warms',
    ask: 'Is it worse under way or with the engine warm?',
    first: 'Follow the hoses through the engine space and tighten their clamps.',
    bring: ['hose clamps', 'a length of hose', 'plugs and caps'],
  },
  switch: {
    name: 'The vacuum switch or its sense line',
    ask: 'Has anybody set the switch, or does the pump stutter?',
    first: 'Compare the switch’s points with your gauge; clear the sense line before adjusting.',
    bring: ['vacuum switch', 'sense line'],
  },
  pump: {
    name: 'A pump that draws slower than it did',
    ask: 'Does it sound different, or has the discharge been slow?',
    first: 'Measure the voltage at the pump while it runs, and see that the discharge is open.',
    bring: ['check valves', 'diaphragm', 'voltmeter'],
  },
  supply: {
    name: 'The supply to the pump, not the pump',
    ask: 'How are the batteries, and is shore power connected?',
    first: 'Measure the voltage at the pump while it runs; clean and tighten its connections.',
    bring: ['voltmeter', 'terminals'],
  },
  'gas-space': {
    name: 'A tank that is filling, not a leak that has grown',
    ask: 'When was the tank last pumped out?',
    first: 'Have it pumped out before anything is taken apart, and look again.',
    bring: [],
  },
  handled: {
    name: 'Something that was touched or moved',
    ask: 'Who worked or stowed near the tank and hoses that day?',
    first: 'Look where the work was done and tighten what was opened.',
    bring: ['hose clamps', 'tank fitting seals'],
  },
}

/** How much a suspect weighs: "about 3.5 times likelier than on any boat". */
export const strengthWords = (strength: number): string =>
  `about ${Number(strength.toPrecision(2))} times likelier than on any boat`

/** What opens the section, from what the record says. */
export function suspectsFinding({ verdict, suspects }: Suspects): string {
  const [first] = suspects
  if (first !== undefined) return `${FAMILY_WORDS[first.family].name} is the likeliest by the record.`
  if (verdict === 'nobody') return 'The record points at no part: begin by asking, looking and tightening.'
  return 'The record is not enough yet to point at a part: begin by asking, looking and tightening.'
}

const USUAL_BAG = ['gauge with a tee', 'check valves', 'bowl seals', 'plugs and caps']

/** What to have in the bag: the suspects' parts, the likeliest first, then what is always wanted; each once. */
export function whatToBring({ suspects }: Pick<Suspects, 'suspects'>): string[] {
  const named = suspects.flatMap(({ family }) => FAMILY_WORDS[family].bring)
  return [...new Set([...named, ...USUAL_BAG])]
}

const LOOKED_FOR: Record<string, string> = {
  'changes-across-flushes': 'a valve that seats differently',
  'seal-drying': 'a seal that dries',
  'cup-test': 'the cup test',
  'signs-together': 'leak against pump and switch',
  plateau: 'a run that stays under the cut-out',
  'past-cut-out': 'a switch that stops late',
  chatter: 'a switch that chatters',
  'late-seating': 'valves that seat late',
  'follows-temperature': 'a leak that follows the temperature',
  'under-way': 'a leak that grows under way',
  'somebody-touched-it': 'a step in working hours',
}

/** `notEnoughWords({ signature: 'late-seating', missing: '20 holds over a week' })` */
export const notEnoughWords = ({ signature, missing }: Suspects['notEnough'][number]): string =>
  `${LOOKED_FOR[signature] ?? signature}: needs ${missing}`
