import type { LogRow } from '@/db/queries/audit'

const LEVELS: Record<string, string> = { figures: 'the leak figures', full: 'the full record' }
const STATEMENTS: Record<string, string> = {
  off: 'said that a system is off',
  'laid-up': 'laid a system up',
  'worked-on': 'said that a system is being worked on',
}

const text = (value: unknown): string | null => (typeof value === 'string' && value !== '' ? value : null)
/** What was changed, where its name in the data is no word. */
const FIELDS: Record<string, string> = {
  timeZone: 'time zone',
  quietHours: 'quiet hours',
  altitudeM: 'altitude',
  toldKinds: 'what it is told',
  onCallId: 'who is on call',
}
const changed = (detail: Record<string, unknown>): string =>
  words(
    Object.keys(detail)
      .filter((field) => field !== 'before')
      .map((field) => FIELDS[field] ?? field)
      .sort(),
  )
const words = (value: unknown): string =>
  Array.isArray(value) && value.length > 0 ? value.map(String).join(', ') : 'none'

/** What somebody did, as the rest of a sentence that begins with their name. */
export function auditWords(row: Pick<LogRow, 'action' | 'detail' | 'shopName'>): string {
  const { action, detail } = row
  const shop = row.shopName ?? 'a shop'
  switch (action) {
    case 'access.given':
      return `let ${shop} see ${LEVELS[text(detail.level) ?? ''] ?? 'the boat'}`
    case 'access.withdrawn':
      return `withdrew the sight of ${shop}`
    case 'record.seen':
      return 'read the full record'
    case 'owner.joined':
      return 'became an owner'
    case 'owner.left':
      return 'is an owner no longer'
    case 'person.joined':
      return `joined the shop as ${text(detail.role) ?? 'one of its people'}`
    case 'person.roles':
      return `set the roles of ${text(detail.name) ?? 'somebody'} to ${words(detail.roles)}`
    case 'person.left':
      return `took ${text(detail.name) ?? 'somebody'} out of the shop`
    case 'invitation.sent':
      return `invited ${text(detail.email) ?? 'somebody'}${text(detail.role) ? ` as ${text(detail.role)}` : ' as owner'}`
    case 'invitation.withdrawn':
      return `took the invitation of ${text(detail.email) ?? 'somebody'} back`
    case 'shop.opened':
      return `opened the shop ${text(detail.name) ?? ''}`.trim()
    case 'shop.changed':
      return `changed the shop: ${changed(detail)}`
    case 'shop.closed':
      return 'closed the shop'
    case 'vessel.created':
      return 'set the boat up'
    case 'vessel.changed':
      return `changed the boat: ${changed(detail)}`
    case 'vessel.aboard':
      return 'said whether anybody is aboard'
    case 'vessel.erased':
      return 'ended the account that owned the boat; its record was erased'
    case 'system.created':
      return 'added a system'
    case 'system.settings':
      return 'changed the system’s figures'
    case 'system.parts':
      return 'drew the system anew'
    case 'system.statement':
      return STATEMENTS[text(detail.value) ?? ''] ?? 'took back what was said of a system'
    case 'cup-test.started':
      return `put a cup of water in ${text(detail.bowl) ?? 'a bowl'}`
    case 'cup-test.taken-back':
      return 'took a cup test back'
    case 'logger.registered':
      return 'registered a logger and was shown its key'
    case 'logger.fitted':
      return 'fitted a logger'
    case 'logger.commissioned':
      return 'finished the checks of a logger'
    case 'logger.key-rolled':
      return 'made a new key for a logger and was shown it'
    case 'logger.retired':
      return 'retired a logger'
    case 'logger.calibrated':
      return 'set a logger’s zero and gain'
    case 'visit.asked':
      return 'asked for a visit'
    case 'visit.changed':
      return 'changed a visit'
    default:
      return action.replaceAll(/[.-]/g, ' ')
  }
}
