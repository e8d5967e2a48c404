export * from './leg-rate'
export * from './merge-bins'
