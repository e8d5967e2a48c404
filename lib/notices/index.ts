export { acknowledgeNotice } from './acknowledge-notice'
export { judgeSystem } from './judge-system'
export { snoozeNotice } from './snooze-notice'
