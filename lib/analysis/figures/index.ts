export * from './figures-of'
export * from './state'
export * from './types'
