export * from './merge-bins'
