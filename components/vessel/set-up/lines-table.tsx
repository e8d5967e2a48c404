import type { SetUpLine } from '@/components/vessel/set-up/set-up-lines'

/** Names and values, line by line. */
export function LinesTable({ lines }: { lines: readonly SetUpLine[] }) {
  return (
    <table className="ruled max-w-[40em]">
      <tbody>
        {lines.map((line) => (
          <tr key={line.name}>
            <th scope="row" className="w-[44%]">
              {line.name}
            </th>
            <td className="break-words">{line.value}</td>
          </tr>
        ))}
      </tbody>
    </table>
  )
}
