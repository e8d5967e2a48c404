'use client'

import { OutcomeMark } from '@/components/register/outcome-mark'
import { useUnits } from '@/components/shell/units-context'
import { figureWords } from '@/shared/commissioning-words'
import type { CommissioningCheck } from '@/shared/schemas'

/** How an attempt came out: mark and word, what was found and what to try, and every figure it rests on. */
export function CheckResult({ check }: { check: CommissioningCheck }) {
  const { units } = useUnits()
  const state = check.outcome ?? 'cannot-tell'
  return (
    <div>
      <p className="text-lead">
        <OutcomeMark state={state} worded />
        <span className="block sm:ml-3 sm:inline">{check.reason}</span>
      </p>
      {check.figures.length > 0 ? (
        <table className="ruled mt-3 max-w-[34em]">
          <tbody>
            {check.figures.map((figure) => (
              <tr key={figure.name}>
                <th scope="row" className="w-[44%]">
                  {figure.name}
                </th>
                <td className="figure">{figureWords(figure, units.vacuum)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      ) : null}
    </div>
  )
}
