export { cupTestsAt, cupTestsKnown } from './cup-tests-at'
export { listCupTests } from './list-cup-tests'
export { startCupTest } from './start-cup-test'
export { takeBackCupTest } from './take-back-cup-test'
