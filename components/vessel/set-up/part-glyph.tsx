import type { PartKind } from '@/shared/schemas'

/** Line drawings of 24 by 24: a bowl, a hose, a tank, a contact, a pump. */
const LINES: Record<PartKind, string> = {
  head: 'M4 8h16M6 8c0 6 3 8 6 8s6-2 6-8M12 16v5M8 21h8M15 8V3h4v5',
  hose: 'M2 8c5 0 5 10 10 10s5-10 10-10M2 4c7 0 5 10 10 10s3-10 10-10',
  tank: 'M5 6c0-3 14-3 14 0v12c0 3-14 3-14 0zM5 6c0 3 14 3 14 0',
  switch: 'M2 14h6M16 14h6M8 14l7-6M8 12v4M16 12v4',
  pump: 'M12 4a8 8 0 1 0 .01 0M9 8l7 4-7 4zM1 12h3M20 12h3',
}

export function PartGlyph({ kind, x, y }: { kind: PartKind; x: number; y: number }) {
  return (
    <path
      d={LINES[kind]}
      transform={`translate(${x} ${y})`}
      fill="none"
      stroke="var(--ink-2)"
      strokeWidth="1.4"
      strokeLinejoin="round"
      strokeLinecap="round"
    />
  )
}
