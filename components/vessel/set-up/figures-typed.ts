import { z } from 'zod'

/** A figure as people type it: `2,5` and `2.5` are one. Null for nothing, NaN for what is no figure. */
export function typed(text: string): number | null {
  const plain = text.trim().replace('−', '-').replace(',', '.')
  if (plain === '') return null
  return /^-?\d*\.?\d+$|^-?\d+\.$/.test(plain) ? Number(plain) : Number.NaN
}

/** A field for a figure that may be left empty: its text in, the figure or null out. */
export const figureField = (low: number, high: number) =>
  z
    .string()
    .transform(typed)
    .refine((value) => !Number.isNaN(value), 'is not a figure')
    .refine(
      (value) => value === null || Number.isNaN(value) || (value >= low && value <= high),
      `must lie between ${low} and ${high}`,
    )

/** The same for a figure that has to be there. */
export const neededFigure = (low: number, high: number) =>
  figureField(low, high).transform((value, context) => {
    if (value !== null) return value
    context.addIssue({ code: 'custom', message: 'is missing' })
    return z.NEVER
  })

/** A stored figure as text to type over, without the noise of conversion: `shown(2.4000001, 2) // "2.4"` */
export const shown = (value: number | null, decimals: number): string =>
  value === null ? '' : String(Number(value.toFixed(decimals)))
