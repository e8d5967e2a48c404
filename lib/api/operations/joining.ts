import { z } from 'zod'
import {
  acceptedSchema,
  acceptInvitationSchema,
  changeShopSchema,
  confirmedSchema,
  confirmEmailSchema,
  doneSchema,
  forgotPasswordSchema,
  idSchema,
  invitationSchema,
  invitationsQuerySchema,
  invitationToSchema,
  inviteSchema,
  listOf,
  logEntrySchema,
  lookAtInvitationSchema,
  openShopSchema,
  pageQuerySchema,
  resetPasswordSchema,
  setRolesSchema,
  shopPersonSchema,
  shopWholeSchema,
  signUpSchema,
  vesselAccessSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Joining'
const created = z.object({ id: idSchema })

export const signUp = operation({
  method: 'post',
  path: '/api/sign-up',
  summary:
    'Ask for an account, for a shop or as an owner; a link comes by mail. The same answer for every address',
  tag,
  access: 'everybody',
  body: signUpSchema,
  output: doneSchema,
})

export const confirmEmail = operation({
  method: 'post',
  path: '/api/confirm-email',
  summary: 'Act on the link of a mail: a new account (with a password), a new address, a further address',
  tag,
  access: 'everybody',
  body: confirmEmailSchema,
  output: confirmedSchema,
})

export const forgotPassword = operation({
  method: 'post',
  path: '/api/password/forgot',
  summary: 'Have a link for a new password sent. The same answer for every address',
  tag,
  access: 'everybody',
  body: forgotPasswordSchema,
  output: doneSchema,
})

export const resetPassword = operation({
  method: 'post',
  path: '/api/password/reset',
  summary: 'Choose a new password by the link of the mail; every session ends',
  tag,
  access: 'everybody',
  body: resetPasswordSchema,
  output: doneSchema,
})

export const listInvitations = operation({
  method: 'get',
  path: '/api/invitations',
  summary: 'Invitations that wait, of a shop or of a vessel',
  tag,
  access: 'signed-in',
  query: invitationsQuerySchema,
  output: listOf(invitationSchema),
})

export const invite = operation({
  method: 'post',
  path: '/api/invitations',
  summary: 'Invite somebody by mail: into a shop with a role, or to own a vessel',
  tag,
  access: 'signed-in',
  body: inviteSchema,
  output: invitationSchema,
  status: 201,
})

export const withdrawInvitation = operation({
  method: 'delete',
  path: '/api/invitations/{id}',
  summary: 'Take an invitation back; its link no longer works',
  tag,
  access: 'signed-in',
  params: byId,
  output: doneSchema,
})

export const resendInvitation = operation({
  method: 'post',
  path: '/api/invitations/{id}/resend',
  summary: 'Send an invitation anew, with a new link and a new term',
  tag,
  access: 'signed-in',
  params: byId,
  output: invitationSchema,
})

export const lookAtInvitation = operation({
  method: 'post',
  path: '/api/invitations/look',
  summary: 'What the link of an invitation invites to; changes nothing',
  tag,
  access: 'everybody',
  body: lookAtInvitationSchema,
  output: invitationToSchema,
})

export const acceptInvitation = operation({
  method: 'post',
  path: '/api/invitations/accept',
  summary: 'Accept: signed in as whom it was sent to, or with a name and a password for a new account',
  tag,
  access: 'everybody',
  body: acceptInvitationSchema,
  output: acceptedSchema,
})

export const getShop = operation({
  method: 'get',
  path: '/api/shops/{id}',
  summary: 'A shop with what it is told and when (managers)',
  tag,
  access: 'signed-in',
  params: byId,
  output: shopWholeSchema,
})

export const changeShop = operation({
  method: 'patch',
  path: '/api/shops/{id}',
  summary: 'Change its name, harbour, zone and what it is told (managers)',
  tag,
  access: 'signed-in',
  params: byId,
  body: changeShopSchema,
  output: shopWholeSchema,
})

export const openShop = operation({
  method: 'post',
  path: '/api/me/shops',
  summary: 'Bring a shop of one’s own, as its first manager',
  tag,
  access: 'signed-in',
  body: openShopSchema,
  output: created,
  status: 201,
})

export const leaveShop = operation({
  method: 'delete',
  path: '/api/me/shops/{id}',
  summary: 'Leave a shop; the last manager stays',
  tag,
  access: 'signed-in',
  params: byId,
  output: doneSchema,
})

export const listPeople = operation({
  method: 'get',
  path: '/api/shops/{id}/people',
  summary: 'Who is in the shop, with their roles (managers)',
  tag,
  access: 'signed-in',
  params: byId,
  output: listOf(shopPersonSchema),
})

export const setRoles = operation({
  method: 'put',
  path: '/api/shops/{id}/people/{personId}',
  summary: 'Set somebody’s roles; none is out of the shop (managers)',
  tag,
  access: 'signed-in',
  params: z.object({ id: idSchema, personId: idSchema }),
  body: setRolesSchema,
  output: doneSchema,
})

export const shopLog = operation({
  method: 'get',
  path: '/api/shops/{id}/log',
  summary: 'Who saw and changed what matters, newest first (managers)',
  tag,
  access: 'signed-in',
  params: byId,
  query: pageQuerySchema,
  output: listOf(logEntrySchema),
})

export const getVesselAccess = operation({
  method: 'get',
  path: '/api/vessels/{id}/access',
  summary: 'Who can see the boat, how much and since when (owners)',
  tag,
  access: 'signed-in',
  params: byId,
  output: vesselAccessSchema,
})

export const vesselLog = operation({
  method: 'get',
  path: '/api/vessels/{id}/log',
  summary: 'Who saw and changed what matters on the boat, newest first (owners)',
  tag,
  access: 'signed-in',
  params: byId,
  query: pageQuerySchema,
  output: listOf(logEntrySchema),
})

export const joiningOperations = [
  signUp,
  confirmEmail,
  forgotPassword,
  resetPassword,
  listInvitations,
  invite,
  withdrawInvitation,
  resendInvitation,
  lookAtInvitation,
  acceptInvitation,
  getShop,
  changeShop,
  openShop,
  leaveShop,
  listPeople,
  setRoles,
  shopLog,
  getVesselAccess,
  vesselLog,
]
