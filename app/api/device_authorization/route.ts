import { handleOAuth } from '@/lib/api/handle-oauth'
import { methods } from '@/lib/api/methods'
import { authorizeDevice } from '@/lib/loggers/authorize-device'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: handleOAuth('device authorization', (form, now) => authorizeDevice(form.client_id, now), {
    limited: true,
  }),
})
