export * from './rate-trend'
