import type { Expectation } from './actors'

/*
 * Who may do what, route by route. Columns, in the order of `ACTORS`:
 *
 *   nobody · strange owner · strange manager · lapsed staff · staff of a shop whose access was withdrawn ·
 *   owner · technician · installer · manager · staff of a shop with the first consent alone
 *
 * `ok` = any 2xx · `in` = sent to sign in · `on` = sent on elsewhere · else the very status. Where a row ends with a
 * status such as 409 or 410 in a column that may, the state of the place says no there, not the right. After ` · `
 * stands a second way of asking the same handler. What is asked, word for word, stands in `requests.ts`.
 *
 * A handler or page on disk without a row here fails the test, and so does a row without a handler or page.
 */

// prettier-ignore
export const HANDLERS: Record<string, Expectation> = {
  //                                            nobody | strangers | once, withdrawn | owner | staff | first consent
  // Vessels
  'GET /api/vessels':                            '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/vessels':                           '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/vessels/{id}':                       '401  404 404  404 404  ok   ok  ok  ok   ok',
  'PATCH /api/vessels/{id}':                     '401  404 404  404 404  ok   403 403 403  403',
  'GET /api/vessels/{id}/aboard':                '401  404 404  404 404  ok   ok  403 ok   403',
  'PUT /api/vessels/{id}/aboard':                '401  404 404  404 404  ok   ok  403 ok   403',
  'GET /api/vessels/{id}/access':                '401  404 404  404 404  ok   403 403 403  403',
  'GET /api/vessels/{id}/log':                   '401  404 404  404 404  ok   403 403 403  403',
  'PUT /api/vessels/{id}/access/{shopId}':       '401  404 404  404 404  ok   403 403 403  403',
  'DELETE /api/vessels/{id}/access/{shopId}':    '401  404 404  404 404  ok   403 403 403  403',
  'POST /api/vessels/{id}/systems':              '401  404 404  404 404  ok   ok  ok  ok   ok',
  'POST /api/vessels/{id}/visits':               '401  404 404  404 404  ok   ok  403 ok   ok',

  // Systems
  'GET /api/systems/{id}/settings':              '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/set-up':                '401  404 404  404 404  ok   ok  ok  ok   ok',
  'PUT /api/systems/{id}/settings':              '401  404 404  404 404  ok   ok  ok  ok   ok',
  'PUT /api/systems/{id}/parts':                 '401  404 404  404 404  ok   ok  ok  ok   ok',
  'PUT /api/systems/{id}/statement':             '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/time-zones':                         '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'PUT /api/statements':                         '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/summary':               '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/runs':                  '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/holds':                 '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/outlook':               '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/trend':                 '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/comparison':            '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/systems/{id}/suspects':              '401  404 404  404 404  ok   ok  403 ok   403',
  'GET /api/systems/{id}/cup-tests':             '401  404 404  404 404  ok   ok  403 ok   403',
  'POST /api/systems/{id}/cup-tests':            '401  404 404  404 404  ok   ok  403 ok   403',
  'DELETE /api/systems/{id}/cup-tests/{testId}': '401  404 404  404 404  ok   ok  403 ok   403',
  // The installer sees the full record while fitting alone.
  'GET /api/systems/{id}/trace':                 '401  404 404  404 404  ok   ok  403 ok   403',
  'GET /api/nights':                             '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/outlook-score':                      '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',

  // Loggers
  'GET /api/loggers':                            '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/loggers/health':                     '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/systems/{id}/loggers':              '401  404 404  404 404  ok   403 ok  ok   ok',
  'DELETE /api/loggers/{id}':                    '401  404 404  404 404  ok   403 ok  ok   ok',
  // The shop's own logger, still on a boat that the shop no longer sees: its key would open that boat's record.
  'DELETE /api/loggers/{id} · left behind':      '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/loggers/{id}/key':                  '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/loggers/{id}/key · left behind':    '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/loggers/{id}/calibrations':         '401  404 404  404 404  ok   ok  ok  ok   ok',
  'POST /api/loggers/{id}/watch':                '401  404 404  404 404  ok   ok  403 ok   403',
  'GET /api/loggers/{id}/commissioning':         '401  404 404  404 404  ok   ok  ok  ok   ok',
  'GET /api/loggers/{id}/commissioning/pdf':     '401  404 404  404 404  ok   ok  ok  ok   ok',
  // Whoever holds the code stands before the logger (RFC 8628); what it is granted for is checked.
  'GET /api/claims/{userCode}':                  '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/claims/{userCode}':                 '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/claims/{userCode} · deny':          '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',

  // Commissionings
  'GET /api/commissionings':                     '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/commissionings':                    '401  404 404  403 404  ok   403 ok  ok   ok',
  'GET /api/commissionings/{id}':                '401  404 404  404 404  ok   403 ok  ok   ok',
  'PATCH /api/commissionings/{id}':              '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/commissionings/{id}/fitting':       '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/commissionings/{id}/checks/{kind}': '401  404 404  404 404  ok   403 ok  ok   ok',
  'GET /api/commissionings/{id}/live':           '401  404 404  404 404  ok   403 ok  ok   ok',
  'POST /api/commissionings/{id}/finish':        '401  404 404  404 404  ok   403 ok  ok   ok',

  // Notices and messages
  'GET /api/notices':                            '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/notices/{id}':                       '401  404 404  404 404  ok   ok  ok  ok   ok',
  'PATCH /api/notices/{id}':                     '401  404 404  404 404  ok   ok  403 ok   ok',
  'POST /api/notices/{id}/acknowledge':          '401  404 404  404 404  ok   ok  403 ok   ok',
  'GET /api/messages':                           '401  403 ok   403 ok   403  403 403 ok   ok',
  'POST /api/messages/{id}/resend':              '401  403 404  403 404  403  403 403 ok   ok',
  // The code in a message is its receiver's right for as long as it lasts.
  'GET /api/links/{code}':                       'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/links/{code}':                      'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  // Demo and test only; without a sign-in on purpose.
  'GET /api/outbox':                             'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',

  // Visits: of the boat's own shop. A shop keeps the visits it did.
  'GET /api/visits':                             '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/visits/{id}':                        '401  404 404  404 404  ok   ok  ok  ok   404',
  'GET /api/visits/{id} · done before':          '401  404 404  404 ok   ok   404 404 404  404',
  'PATCH /api/visits/{id}':                      '401  404 404  404 404  403  ok  403 ok   404',
  'POST /api/visits/{id}/gauge-tests':           '401  404 404  404 404  403  ok  403 ok   404',
  'POST /api/visits/{id}/entries':               '401  404 404  404 404  403  ok  403 ok   404',
  'POST /api/visits/{id}/part-changes':          '401  404 404  404 404  403  ok  403 ok   404',

  // Oneself
  'GET /api/me':                                 '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'PATCH /api/me':                               '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'PUT /api/me/password':                        '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'PUT /api/me/email':                           '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/me/export':                          '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/me/sessions':                        '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'DELETE /api/me/sessions':                     '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'DELETE /api/me/sessions/{id}':                '401  404 404  404 404  ok   404 404 404  404',
  'GET /api/me/contacts':                        '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/me/contacts':                       '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'PATCH /api/me/contacts/{id}':                 '401  404 404  404 404  ok   404 404 404  404',
  'DELETE /api/me/contacts/{id}':                '401  404 404  404 404  ok   404 404 404  404',
  'POST /api/me/contacts/{id}/proof':            '401  404 404  404 404  ok   404 404 404  404',
  'POST /api/me/contacts/{id}/verify':           '401  404 404  404 404  410  404 404 404  404',
  'GET /api/me/second-factor':                   '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/me/second-factor':                  '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'PUT /api/me/second-factor':                   '401  409 409  409 409  409  409 409 409  409',
  'POST /api/me/second-factor/off':              '401  409 409  409 409  409  409 409 409  409',
  'POST /api/me/second-factor/recovery-codes':   '401  409 409  409 409  409  409 409 409  409',
  'POST /api/me/shops':                          '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'DELETE /api/me/shops/{id}':                   '401  404 404  404 404  404  ok  ok  ok   404',
  'GET /api/account/delete':                     '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/account/delete':                    '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',

  // The shop
  'GET /api/shops':                              '401  ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/shops/{id}':                         '401  404 404  404 404  404  403 403 ok   404',
  'PATCH /api/shops/{id}':                       '401  404 404  404 404  404  403 403 ok   404',
  'GET /api/shops/{id}/people':                  '401  404 404  404 404  404  403 403 ok   404',
  'PUT /api/shops/{id}/people/{personId}':       '401  404 404  404 404  404  403 403 ok   404',
  'GET /api/shops/{id}/log':                     '401  404 404  404 404  404  403 403 ok   404',

  // Joining
  'GET /api/invitations':                        '401  404 404  404 404  404  403 403 ok   404',
  'GET /api/invitations · of a vessel':          '401  404 404  404 404  ok   403 403 403  403',
  'POST /api/invitations':                       '401  404 404  404 404  404  403 403 ok   404',
  'POST /api/invitations · to a vessel':         '401  404 404  404 404  ok   403 403 403  403',
  'DELETE /api/invitations/{id}':                '401  404 404  404 404  404  403 403 ok   404',
  'DELETE /api/invitations/{id} · to a vessel':  '401  404 404  404 404  ok   403 403 403  403',
  'POST /api/invitations/{id}/resend':           '401  404 404  404 404  404  403 403 ok   404',
  // The secret in the mail is the right; accepting is for whom it was sent to.
  'POST /api/invitations/look':                  'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/invitations/accept':                'ok   403 403  403 403  403  403 403 403  403',
  'POST /api/sign-up':                           'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/confirm-email':                     'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/password/forgot':                   'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/password/reset':                    'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',

  // For everybody, and for machines with a secret of their own
  'POST /api/leak-down':                         'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/isolation':                         'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/health':                             'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'GET /api/openapi.json':                       'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  'POST /api/device_authorization':              'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  // A made-up device code.
  'POST /api/token':                             '400  400 400  400 400  400  400 400 400  400',
  // A session is no logger key.
  'POST /api/ingest':                            '401  401 401  401 401  401  401 401 401  401',
  // Not signed by the text service.
  'POST /api/sms/inbound':                       '403  403 403  403 403  403  403 403 403  403',
  'POST /api/sms/status':                        '403  403 403  403 403  403  403 403 403  403',
  'GET /api/auth/{nextauth}':                    'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  // Without the token against forged forms.
  'POST /api/auth/{nextauth}':                   '401  401 401  401 401  401  401 401 401  401',
  'GET /api/{path}':                             '404  404 404  404 404  404  404 404 404  404',
  'POST /api/{path}':                            '404  404 404  404 404  404  404 404 404  404',
  'PUT /api/{path}':                             '404  404 404  404 404  404  404 404 404  404',
  'PATCH /api/{path}':                           '404  404 404  404 404  404  404 404 404  404',
  'DELETE /api/{path}':                          '404  404 404  404 404  404  404 404 404  404',
  'OPTIONS /api/{path}':                         '404  404 404  404 404  404  404 404 404  404',
}

/** Pages. A page is a frame: what fills it comes from the handlers above, and is refused there. */
// prettier-ignore
export const PAGES: Record<string, Expectation> = {
  '/':                                           'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/calculators':                                'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/sign-in':                                    'ok   on  on   on  on   on   on  on  on   on',
  '/outbox':                                     'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/tonight':                                    'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/fleet':                                      'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/notices':                                    'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/vessels/{id}':                               'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/vessels/{id}/record':                        'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/vessels/{id}/pump':                          'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/vessels/{id}/notices':                       'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/vessels/{id}/visits':                        'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/vessels/{id}/set-up':                        'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/register':                                   'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/register/{id}':                              'in   404 404  404 404  on   404 on  on   on',
  '/register/{id}/{step}':                       'in   404 404  404 404  ok   404 ok  ok   ok',
  '/claim':                                      'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/loggers':                                    'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/loggers/{id}':                               'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/loggers/{id}/commissioning':                 'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/loggers/claim':                              'on   on  on   on  on   on   on  on  on   on',
  '/people':                                     'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/shop':                                       'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/vessels/{id}/access':                        'in   404 404  404 404  ok   ok  ok  ok   ok',
  '/account':                                    'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/account/security':                           'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/account/messages':                           'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/account/aboard':                             'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/account/boat':                               'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/account/shop':                               'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/account/data':                               'in   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/sign-up':                                    'ok   on  on   on  on   on   on  on  on   on',
  '/forgot-password':                            'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  // The secret in the address is the right.
  '/reset-password/{token}':                     'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/confirm/{token}':                            'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  '/invitation/{token}':                         'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
  // Shows what the message told its receiver; acting on it is a POST.
  '/a/{code}':                                   'ok   ok  ok   ok  ok   ok   ok  ok  ok   ok',
}
