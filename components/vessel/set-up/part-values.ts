import { z } from 'zod'
import { partKindSchema, type Part, type PartInput, type PartKind } from '@/shared/schemas'
import { fromM3, toM3, type UnitChoice } from '@/shared/units'
import { figureField, shown } from './figures-typed'
import { SHAPES, sizeUnit, volumeM3 } from './volumes'

const LARGEST_M3 = 10

export const partValuesSchema = z.object({
  key: z.string(),
  kind: partKindSchema,
  name: z.string().trim().min(1, 'is missing').max(120),
  /** Key of the next part towards the tank; empty for none. */
  parent: z.string(),
  shape: z.enum(SHAPES),
  volume: figureField(0, 10_000),
  sizes: z.array(figureField(0, 10_000)).length(3),
  /** The volume as stored, and as it was shown: what nobody typed over is sent back to the last digit. */
  storedM3: z.number().nullable(),
  storedText: z.string(),
})
export const partsFormSchema = z
  .object({ parts: z.array(partValuesSchema).max(200) })
  .superRefine(({ parts }, context) => {
    parts.forEach((part, index) => {
      const names = parts.filter((other) => other.name === part.name).length
      if (names > 1)
        context.addIssue({ code: 'custom', path: ['parts', index, 'name'], message: 'is another part’s' })
      if (part.shape === 'typed') return
      const needed = part.shape === 'box' ? 3 : 2
      part.sizes.slice(0, needed).forEach((size, place) => {
        if (size === null || size <= 0)
          context.addIssue({
            code: 'custom',
            path: ['parts', index, 'sizes', place],
            message: size === null ? 'is missing' : 'must be above nought',
          })
      })
    })
  })
export type PartValues = z.input<typeof partValuesSchema>
export type PartsValues = z.input<typeof partsFormSchema>

export const KIND_OF_PART: Record<PartKind, string> = {
  head: 'head',
  hose: 'hose',
  tank: 'tank',
  switch: 'switch',
  pump: 'pump',
}

/** Parts as the form holds them, in the reader's unit. */
export const partValues = (parts: readonly Part[], units: UnitChoice): PartValues[] =>
  parts.map((part) => {
    const text = part.volumeM3 === null ? '' : shown(fromM3(part.volumeM3, units.volume), 3)
    return {
      key: part.key,
      kind: part.kind,
      name: part.name,
      parent: part.parent ?? '',
      shape: 'typed',
      volume: text,
      sizes: ['', '', ''],
      storedM3: part.volumeM3,
      storedText: text,
    }
  })

/** A key that no part has yet, made of the kind: `head-2`. */
export function freeKey(kind: PartKind, taken: ReadonlySet<string>): string {
  let number = 1
  while (taken.has(`${kind}-${number}`)) number += 1
  return `${kind}-${number}`
}

/** A new part of a kind, led where parts of its kind usually lead: heads to the tank, the tank to the pump. */
export function newPart(kind: PartKind, parts: readonly { key: string; kind: PartKind }[]): PartValues {
  const key = freeKey(kind, new Set(parts.map((part) => part.key)))
  const number = parts.filter((part) => part.kind === kind).length + 1
  const word = `${kind.charAt(0).toUpperCase()}${kind.slice(1)}`
  const tank = parts.find((part) => part.kind === 'tank')
  return {
    key,
    kind,
    name: number === 1 ? word : `${word} ${number}`,
    parent: kind === 'tank' ? '' : (tank?.key ?? ''),
    shape: 'typed',
    volume: '',
    sizes: ['', '', ''],
    storedM3: null,
    storedText: '',
  }
}

/** The parts without one: what led to it leads on to where it led. */
export function withoutPart<One extends { key: string; parent: string }>(
  parts: readonly One[],
  key: string,
): One[] {
  const gone = parts.find((part) => part.key === key)
  return parts
    .filter((part) => part.key !== key)
    .map((part) =>
      part.parent === key ? { ...part, parent: gone?.parent === part.key ? '' : (gone?.parent ?? '') } : part,
    )
}

type Checked = z.output<typeof partValuesSchema>

/** The gas volume that a part's entries say, m³; null while they say none. */
export function saidVolumeM3(part: Checked, typedText: string, units: UnitChoice): number | null {
  if (part.shape === 'typed') {
    if (typedText === part.storedText) return part.storedM3
    return part.volume === null ? null : toM3(part.volume, units.volume)
  }
  const { shape } = part
  return volumeM3(
    shape,
    part.sizes.map((size, place) =>
      size === null ? null : size * sizeUnit(shape, place, units.volume).metres,
    ),
  )
}

/** What is sent: PUT /api/systems/{id}/parts. */
export function partsToSend(parts: readonly Checked[], units: UnitChoice): PartInput[] {
  return parts.map((part) => {
    const text = part.volume === null ? '' : shown(part.volume, 3)
    const volume = saidVolumeM3(part, text, units)
    return {
      key: part.key,
      kind: part.kind,
      name: part.name,
      volumeM3: volume === null ? null : Math.min(volume, LARGEST_M3),
      parent: part.parent === '' ? null : part.parent,
    }
  })
}
