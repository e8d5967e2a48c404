const BROWSERS: readonly [RegExp, string][] = [
  [/Edg\//, 'Edge'],
  [/Firefox\//, 'Firefox'],
  [/Chrome\//, 'Chrome'],
  [/Safari\//, 'Safari'],
]
const SYSTEMS: readonly [RegExp, string][] = [
  [/iPhone|iPad/, 'iOS'],
  [/Android/, 'Android'],
  [/Windows/, 'Windows'],
  [/Mac OS X/, 'macOS'],
  [/Linux/, 'Linux'],
]

/** A device as people call it: `deviceName('… Android … Chrome/120 …') // "Chrome on Android"`. */
export function deviceName(userAgent: string | null): string {
  const find = (list: readonly [RegExp, string][]) =>
    list.find(([pattern]) => pattern.test(userAgent ?? ''))?.[1]
  const [browser, system] = [find(BROWSERS), find(SYSTEMS)]
  if (browser === undefined) return system ?? 'A program'
  return system === undefined ? browser : `${browser} on ${system}`
}
