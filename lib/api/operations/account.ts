import { z } from 'zod'
import {
  aboardSpanSchema,
  addContactSchema,
  beginSecondFactorSchema,
  begunSecondFactorSchema,
  changeContactSchema,
  changeEmailSchema,
  confirmSecondFactorSchema,
  contactSchema,
  deleteAccountSchema,
  deletionSchema,
  doneSchema,
  endSecondFactorSchema,
  exportSchema,
  listOf,
  recoveryCodesSchema,
  secondFactorSchema,
  sessionSchema,
  verifyContactSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Account'
const signedIn = { tag, access: 'signed-in' } as const
const bySession = z.object({ id: z.uuid() })

export const changeEmail = operation({
  ...signedIn,
  method: 'put',
  path: '/api/me/email',
  summary: 'Change the account’s address; takes effect by the link sent there',
  body: changeEmailSchema,
  output: doneSchema,
})

export const listSessions = operation({
  ...signedIn,
  method: 'get',
  path: '/api/me/sessions',
  summary: 'Where one is signed in',
  output: listOf(sessionSchema),
})
export const endOtherSessions = operation({
  ...signedIn,
  method: 'delete',
  path: '/api/me/sessions',
  summary: 'Sign every other device out',
  output: doneSchema,
})
export const endSession = operation({
  ...signedIn,
  method: 'delete',
  path: '/api/me/sessions/{id}',
  summary: 'Sign one device out',
  params: bySession,
  output: doneSchema,
})

export const getSecondFactor = operation({
  ...signedIn,
  method: 'get',
  path: '/api/me/second-factor',
  summary: 'Whether signing in asks for a code',
  output: secondFactorSchema,
})
export const beginSecondFactor = operation({
  ...signedIn,
  method: 'post',
  path: '/api/me/second-factor',
  summary: 'Make a secret for the device to take up (RFC 6238)',
  body: beginSecondFactorSchema,
  output: begunSecondFactorSchema,
})
export const confirmSecondFactor = operation({
  ...signedIn,
  method: 'put',
  path: '/api/me/second-factor',
  summary: 'Turn it on with the device’s first code; answers the recovery codes, once',
  body: confirmSecondFactorSchema,
  output: recoveryCodesSchema,
})
export const endSecondFactor = operation({
  ...signedIn,
  method: 'post',
  path: '/api/me/second-factor/off',
  summary: 'Turn it off, by password and code',
  body: endSecondFactorSchema,
  output: doneSchema,
})
export const renewRecoveryCodes = operation({
  ...signedIn,
  method: 'post',
  path: '/api/me/second-factor/recovery-codes',
  summary: 'New recovery codes; the old ones no longer work',
  body: endSecondFactorSchema,
  output: recoveryCodesSchema,
})

export const listContacts = operation({
  ...signedIn,
  method: 'get',
  path: '/api/me/contacts',
  summary: 'Addresses one is told things by',
  output: listOf(contactSchema),
})
export const addContact = operation({
  ...signedIn,
  method: 'post',
  path: '/api/me/contacts',
  summary: 'Add an address; a code or a link goes to it',
  body: addContactSchema,
  output: contactSchema,
  status: 201,
})
export const changeContact = operation({
  ...signedIn,
  method: 'patch',
  path: '/api/me/contacts/{id}',
  summary: 'What is told by this address, and whether anything is',
  params: byId,
  body: changeContactSchema,
  output: contactSchema,
})
export const removeContact = operation({
  ...signedIn,
  method: 'delete',
  path: '/api/me/contacts/{id}',
  summary: 'Forget an address',
  params: byId,
  output: doneSchema,
})
export const verifyContact = operation({
  ...signedIn,
  method: 'post',
  path: '/api/me/contacts/{id}/verify',
  summary: 'Prove a number with the six digits sent to it',
  params: byId,
  body: verifyContactSchema,
  output: contactSchema,
})
export const resendProof = operation({
  ...signedIn,
  method: 'post',
  path: '/api/me/contacts/{id}/proof',
  summary: 'Send the code or the link again',
  params: byId,
  output: doneSchema,
})

export const listAboard = operation({
  ...signedIn,
  method: 'get',
  path: '/api/vessels/{id}/aboard',
  summary: 'What was said of people aboard, from now on',
  params: byId,
  output: listOf(aboardSpanSchema),
})

export const exportAccount = operation({
  ...signedIn,
  method: 'get',
  path: '/api/me/export',
  summary: 'All that is kept of oneself, as one file',
  output: exportSchema,
})
export const previewDeletion = operation({
  ...signedIn,
  method: 'get',
  path: '/api/account/delete',
  summary: 'What would go with the account and what would stay',
  output: deletionSchema,
})
export const deleteAccount = operation({
  ...signedIn,
  method: 'post',
  path: '/api/account/delete',
  summary: 'End the account for good',
  body: deleteAccountSchema,
  output: doneSchema,
})

export const accountOperations = [
  changeEmail,
  listSessions,
  endOtherSessions,
  endSession,
  getSecondFactor,
  beginSecondFactor,
  confirmSecondFactor,
  endSecondFactor,
  renewRecoveryCodes,
  listContacts,
  addContact,
  changeContact,
  removeContact,
  verifyContact,
  resendProof,
  listAboard,
  exportAccount,
  previewDeletion,
  deleteAccount,
]
