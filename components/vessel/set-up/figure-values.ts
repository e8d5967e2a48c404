import { z } from 'zod'
import {
  dateSchema,
  systemKindSchema,
  type ChangeSettings,
  type Settings,
  type SystemKind,
} from '@/shared/schemas'
import { fromPa, toPa, type VacuumUnit } from '@/shared/units'
import { startOfDay, type Offsets } from './days'
import { figureField, neededFigure, shown } from './figures-typed'

export const KINDS: Record<SystemKind, { word: string; means: string }> = {
  'pass-through': {
    word: 'Pass-through',
    means: 'Waste goes through to the pump and on; the tank holds vacuum alone.',
  },
  collecting: {
    word: 'Collecting',
    means: 'Waste stays in the tank under vacuum, so its gas space shrinks as it fills.',
  },
  unit: {
    word: 'Unit',
    means: 'Pump and tank are one; there is no place to test at the pump’s inlet.',
  },
  'two-pumps': {
    word: 'Two pumps or tanks',
    means: 'Draw the parts of both; each pump can be left out of a test.',
  },
  'on-demand': {
    word: 'On demand',
    means: 'No standing vacuum: there is no hold time to judge, the pump alone is watched.',
  },
}

const HOUR = 3600
const VACUUM_MOST: Record<VacuumUnit, number> = { inHg: 29, kPa: 101, mbar: 1013 }
const DECIMALS: Record<VacuumUnit, number> = { inHg: 2, kPa: 2, mbar: 1 }

/** Figures as typed in the reader's unit; the schema knows which one. */
export const figuresFormSchema = (unit: VacuumUnit) =>
  z
    .object({
      kind: systemKindSchema,
      name: z.string().trim().max(120),
      cutOut: figureField(0.1, VACUUM_MOST[unit]),
      cutIn: figureField(0.1, VACUUM_MOST[unit]),
      limitHours: neededFigure(0.02, 8760),
      aimHours: neededFigure(0.02, 8760),
      silenceHours: neededFigure(0.02, 8760),
      pumpAmps: figureField(0.1, 1000),
      lowSupplyV: figureField(1, 60),
      when: z.enum(['now', 'day']),
      day: z.union([z.literal(''), dateSchema]),
    })
    .superRefine((values, context) => {
      const wrong = (path: string, message: string) =>
        context.addIssue({ code: 'custom', path: [path], message })
      if (values.cutOut !== null && values.cutIn !== null && values.cutOut <= values.cutIn)
        wrong('cutIn', 'must be less vacuum than where the pump stops')
      if (values.limitHours > values.aimHours) wrong('aimHours', 'must not be shorter than the limit')
      if (values.when === 'day' && values.day === '') wrong('day', 'is missing')
    })
export type FigureValues = z.input<ReturnType<typeof figuresFormSchema>>
type Checked = z.output<ReturnType<typeof figuresFormSchema>>

export const figureValues = (settings: Settings, name: string, unit: VacuumUnit): FigureValues => {
  const vacuum = (pa: number | null) => shown(pa === null ? null : fromPa(pa, unit), DECIMALS[unit])
  return {
    kind: settings.kind,
    name,
    cutOut: vacuum(settings.cutOutPa),
    cutIn: vacuum(settings.cutInPa),
    limitHours: shown(settings.limitSeconds / HOUR, 3),
    aimHours: shown(settings.aimSeconds / HOUR, 3),
    silenceHours: shown(settings.silenceSeconds / HOUR, 3),
    pumpAmps: shown(settings.pumpAmps, 2),
    lowSupplyV: shown(settings.lowSupplyV, 2),
    when: 'now',
    day: '',
  }
}

/** What is sent: only what was changed, so that a figure nobody touched is not rounded. Null when nothing was. */
export function figuresToSend(
  values: Checked,
  was: FigureValues,
  unit: VacuumUnit,
  offsets: Offsets,
): ChangeSettings | null {
  const before = figuresFormSchema(unit).parse({ ...was, when: 'now', day: '' })
  const vacuum = (value: number | null) => (value === null ? null : toPa(value, unit))
  const seconds = (hours: number) => Math.round(hours * HOUR)
  const change: ChangeSettings = {
    ...(values.kind === before.kind ? {} : { kind: values.kind }),
    ...(values.name === before.name ? {} : { name: values.name }),
    ...(values.cutOut === before.cutOut ? {} : { cutOutPa: vacuum(values.cutOut) }),
    ...(values.cutIn === before.cutIn ? {} : { cutInPa: vacuum(values.cutIn) }),
    ...(values.limitHours === before.limitHours ? {} : { limitSeconds: seconds(values.limitHours) }),
    ...(values.aimHours === before.aimHours ? {} : { aimSeconds: seconds(values.aimHours) }),
    ...(values.silenceHours === before.silenceHours ? {} : { silenceSeconds: seconds(values.silenceHours) }),
    ...(values.pumpAmps === before.pumpAmps ? {} : { pumpAmps: values.pumpAmps }),
    ...(values.lowSupplyV === before.lowSupplyV ? {} : { lowSupplyV: values.lowSupplyV }),
  }
  if (Object.keys(change).length === 0) return null
  return values.when === 'day' ? { ...change, inForceFrom: startOfDay(values.day, offsets) } : change
}
