export * from './find-steps'
export type { LegRate } from './leg-noise'
