import type { Metadata } from 'next'
import { LeakDown } from '@/app/calculators/leak-down'

export const metadata: Metadata = {
  title: 'Leak-down',
  description: 'Two vacuum gauge readings to leak rate, hold time and verdict, with a chart to print.',
}

export default function CalculatorsPage() {
  return <LeakDown />
}
