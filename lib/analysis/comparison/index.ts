export * from './compare'
export type * from './types'
