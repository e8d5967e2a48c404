export * from './estimate-hold-time'
export * from './from-legs'
export * from './from-short-holds'
export * from './types'
