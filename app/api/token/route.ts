import { handleOAuth } from '@/lib/api/handle-oauth'
import { methods } from '@/lib/api/methods'
import { deviceToken } from '@/lib/loggers/device-token'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handleOAuth('device token', deviceToken),
})
