import type { SignatureFinding, SignatureInput, Suspect } from './types'

/** Water cuts a bowl seal's flow to about a thirtieth: less than this share left is that seal. */
const FELL_TO = 0.7
const SURE = 2

/**
 * The cup test: the rate before, after water in one bowl, and after the next flush. A rate that falls by a third
 * with water, surely, is that bowl's seal (the surer when a flush brings it back); one that surely stays clears
 * it. No test: not enough.
 */
export function cupTest({ cupTests }: Pick<SignatureInput, 'cupTests'>): SignatureFinding {
  const signature = 'cup-test' as const
  if (cupTests.length === 0)
    return { signature, enough: false, missing: 'a cup of water in one bowl, and an hour' }
  const suspects = cupTests.flatMap((test): Suspect[] => {
    const { before, wet, after, headName } = test
    const error = Math.hypot(before.sigma, wet.sigma)
    const fell = before.paPerHour - wet.paPerHour
    if (fell > SURE * error && wet.paPerHour < FELL_TO * before.paPerHour) {
      const back =
        after !== null && after.paPerHour - wet.paPerHour > SURE * Math.hypot(after.sigma, wet.sigma)
      const share = Math.round((100 * fell) / before.paPerHour)
      const basis = `water in ${headName} took ${share} % of the leak away${back ? ', and a flush brought it back' : ''}`
      return [
        {
          family: 'bowl-seal',
          strength: back ? 20 : 8,
          basis,
          overturnedBy: `the same again with ${headName} wet`,
        },
      ]
    }
    const cleared = fell + SURE * error < 0.3 * before.paPerHour
    if (!cleared) return []
    const basis = `water in ${headName} changed nothing: its seal is cleared`
    return [{ family: 'bowl-seal', strength: 0.5, basis, overturnedBy: 'a fall with water in another bowl' }]
  })
  return { signature, enough: true, suspects }
}
