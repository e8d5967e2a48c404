import {
  changeMeSchema,
  changePasswordSchema,
  doneSchema,
  listOf,
  meSchema,
  shopSchema,
} from '@/shared/schemas'
import { operation } from '../operation'

const tag = 'People'

export const getMe = operation({
  method: 'get',
  path: '/api/me',
  summary: 'Who is signed in, their roles, shops and units',
  tag,
  access: 'signed-in',
  output: meSchema,
})

export const changeMe = operation({
  method: 'patch',
  path: '/api/me',
  summary: 'Change one’s name or units',
  tag,
  access: 'signed-in',
  body: changeMeSchema,
  output: meSchema,
})

export const changePassword = operation({
  method: 'put',
  path: '/api/me/password',
  summary: 'Set a new password; ends every other session',
  tag,
  access: 'signed-in',
  body: changePasswordSchema,
  output: doneSchema,
})

export const listShops = operation({
  method: 'get',
  path: '/api/shops',
  summary: 'Shops by name, for an owner to choose from',
  tag,
  access: 'signed-in',
  output: listOf(shopSchema),
})

export const peopleOperations = [getMe, changeMe, changePassword, listShops]
