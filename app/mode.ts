import { env } from '@/lib/env'

/** Demo and test show the demo accounts and the outbox; production never does. */
export const isDemo = (): boolean => env().mode !== 'production'

/** The password of the demo accounts, for the pages of the demo alone. */
export const demoPassword = (): string => env().demoPassword
