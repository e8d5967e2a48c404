import type { Finding, JudgedKind } from '@/lib/notices/record'

/** What a notice makes no news: it follows from it. */
const FOLLOWS: Partial<Record<JudgedKind, JudgedKind[]>> = {
  'sensor-fault': ['short-cycling', 'short-hold', 'switch-drift', 'slow-recharge', 'no-start', 'running-on'],
  'short-cycling': ['short-hold'],
  'running-on': ['slow-recharge'],
}

/** @returns for each kind the other whose presence explains it, or nothing. */
export function explainedBy(findings: Map<JudgedKind, Finding>): Map<JudgedKind, JudgedKind> {
  const explained = new Map<JudgedKind, JudgedKind>()
  for (const [kind, follows] of Object.entries(FOLLOWS) as [JudgedKind, JudgedKind[]][]) {
    if (findings.get(kind)?.is !== 'present') continue
    for (const other of follows) if (!explained.has(other)) explained.set(other, kind)
  }
  return explained
}
