import { inject } from 'vitest'
import { testEnvironment } from './settings'

// Ticks, worker steps and services that tests call in their own process read the same environment as the server.
Object.assign(process.env, testEnvironment(inject('settings')))
