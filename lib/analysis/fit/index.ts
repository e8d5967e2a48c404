export * from './fit-legs'
export * from './leak-law'
export * from './leg-equations'
export * from './types'
