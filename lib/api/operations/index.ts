import type { Operation } from '../operation'
import { commissioningOperations } from './commissionings'
import { accountOperations } from './account'
import { cupTestOperations } from './cup-tests'
import { joiningOperations } from './joining'
import { linkOperations } from './links'
import { loggerOperations } from './loggers'
import { noticeOperations } from './notices'
import { peopleOperations } from './people'
import { readingOperations } from './reading'
import { serviceOperations } from './service'
import { setUpOperations } from './set-up'
import { suspectsOperations } from './suspects'
import { vesselOperations } from './vessels'
import { visitOperations } from './visits'

/** Every address with a schema of its own; sign-in and the upload of samples are described beside them. */
export const OPERATIONS: readonly Operation[] = [
  ...vesselOperations,
  ...setUpOperations,
  ...loggerOperations,
  ...commissioningOperations,
  ...readingOperations,
  ...suspectsOperations,
  ...cupTestOperations,
  ...noticeOperations,
  ...linkOperations,
  ...visitOperations,
  ...peopleOperations,
  ...joiningOperations,
  ...accountOperations,
  ...serviceOperations,
]

/** Addresses that other machines of ours call, and no client: left out of the document on purpose. */
export const INTERNAL_PATHS: readonly string[] = ['/api/{path}', '/api/sms/inbound', '/api/sms/status']
