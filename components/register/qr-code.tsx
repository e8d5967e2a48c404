'use client'

import { create } from 'qrcode'
import { useMemo } from 'react'

const QUIET_MODULES = 4

/** A text as a QR code, dark on white by day and by night, since most readers take no other. */
export function QrCode({ text, label }: { text: string; label: string }) {
  const { path, size } = useMemo(() => {
    const { modules } = create(text, { errorCorrectionLevel: 'M' })
    const cells: string[] = []
    for (let y = 0; y < modules.size; y += 1) {
      for (let x = 0; x < modules.size; x += 1) {
        if (modules.get(y, x)) cells.push(`M${x + QUIET_MODULES} ${y + QUIET_MODULES}h1v1h-1z`)
      }
    }
    return { path: cells.join(''), size: modules.size + 2 * QUIET_MODULES }
  }, [text])
  return (
    <svg
      viewBox={`0 0 ${size} ${size}`}
      role="img"
      aria-label={label}
      shapeRendering="crispEdges"
      className="w-full max-w-[15rem]"
    >
      <rect width={size} height={size} fill="#fff" />
      <path d={path} fill="#000" />
    </svg>
  )
}
