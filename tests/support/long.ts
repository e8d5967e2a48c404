/** How often a property is tried: ten times as often in the long run (`npm run test:long`). */
export const times = (runs: number): number => (process.env.LONG ? runs * 10 : runs)
