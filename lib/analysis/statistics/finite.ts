/** The finite values in a new list: what every function here does with NaN and infinities is leave them out. */
export function finite(values: readonly number[]): number[] {
  return values.filter((value) => Number.isFinite(value))
}

/** The finite values in a new list, ascending. */
export function sortedFinite(values: readonly number[]): number[] {
  return finite(values).sort((a, b) => a - b)
}

/** Sum of f(t) over the groups of equal values, each of size t. Takes an ascending list. */
export function sumOverTies(sorted: readonly number[], f: (size: number) => number): number {
  let sum = 0
  let size = 0
  sorted.forEach((value, index) => {
    size += 1
    if (sorted[index + 1] === value) return
    sum += f(size)
    size = 0
  })
  return sum
}

/** Whether an ascending list holds two equal values. */
export function hasTies(sorted: readonly number[]): boolean {
  return sorted.some((value, index) => sorted[index + 1] === value)
}

/** Ranks from 1, equal values sharing the mean of theirs, in the order given. */
export function midranks(values: readonly number[]): number[] {
  const order = values.map((value, index) => ({ value, index })).sort((a, b) => a.value - b.value)
  const ranks = new Array<number>(values.length).fill(0)
  let from = 0
  order.forEach((item, position) => {
    if (order[position + 1]?.value === item.value) return
    for (const tied of order.slice(from, position + 1)) ranks[tied.index] = (from + position) / 2 + 1
    from = position + 1
  })
  return ranks
}
