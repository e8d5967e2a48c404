export * from './figures-input'
export * from './figures-of'
export * from './state'
export * from './types'
