'use client'

import { useEffect, useRef, useState } from 'react'
import { codeIn } from '@/components/register/scanned-code'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'

interface Detector {
  detect(source: HTMLVideoElement): Promise<{ rawValue: string }[]>
}
type DetectorMaker = new (options: { formats: string[] }) => Detector

/** Where the browser has it; not yet part of the types that come with TypeScript. */
function detectorMaker(): DetectorMaker | null {
  if (typeof window === 'undefined' || !('BarcodeDetector' in window)) return null
  if (!('mediaDevices' in navigator)) return null
  const made: unknown = window.BarcodeDetector
  return typeof made === 'function' ? (made as DetectorMaker) : null // as the Shape Detection draft has it
}

const EVERY_MS = 250

/** Reads the code from the logger's label or screen with the camera; offered only where the browser can. */
export function Scan({ onCode }: { onCode: (code: string) => void }) {
  const video = useRef<HTMLVideoElement>(null)
  const [able, setAble] = useState(false)
  const [on, setOn] = useState(false)
  const [trouble, setTrouble] = useState<string | null>(null)
  useEffect(() => {
    // Known only in the browser, after the first frame.
    const timer = setTimeout(() => setAble(detectorMaker() !== null))
    return () => clearTimeout(timer)
  }, [])
  useEffect(() => {
    const Maker = detectorMaker()
    if (!on || Maker === null) return
    const detector = new Maker({ formats: ['qr_code'] })
    let stream: MediaStream | null = null
    let ended = false
    const look = async () => {
      const source = video.current
      if (source === null || source.readyState < 2) return
      for (const { rawValue } of await detector.detect(source)) {
        const code = codeIn(rawValue)
        if (code !== null && !ended) {
          setOn(false)
          onCode(code)
          return
        }
      }
    }
    navigator.mediaDevices
      .getUserMedia({ video: { facingMode: 'environment' } })
      .then((given) => {
        if (ended) return given.getTracks().forEach((track) => track.stop())
        stream = given
        if (video.current) video.current.srcObject = given
      })
      .catch(() => {
        setTrouble('The camera may not be used here. Type the code instead.')
        setOn(false)
      })
    const timer = setInterval(() => void look().catch(() => undefined), EVERY_MS)
    return () => {
      ended = true
      clearInterval(timer)
      stream?.getTracks().forEach((track) => track.stop())
    }
  }, [on, onCode])
  if (!able) return null
  return (
    <div className="grid gap-2">
      {on ? (
        <video
          ref={video}
          autoPlay
          muted
          playsInline
          aria-label="What the camera sees"
          className="aspect-square w-full max-w-[20rem] rounded-sm border border-field object-cover"
        />
      ) : null}
      <div>
        <Button weight="quiet" onClick={() => setOn(!on)}>
          {on ? 'Stop the camera' : 'Scan it with the camera'}
        </Button>
      </div>
      {trouble ? <Trouble title={trouble} /> : null}
    </div>
  )
}
