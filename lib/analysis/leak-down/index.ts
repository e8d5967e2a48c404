export * from './judge-leak-down'
export * from './limits'
export * from './verdict'
