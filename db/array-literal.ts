/**
 * A PostgreSQL array literal, for binding a whole column at once (`?::real[]`). Null stays null; text is quoted.
 * @example arrayLiteral([1, null, 2]) // "{1,NULL,2}"
 */
export function arrayLiteral(values: readonly (string | number | boolean | null)[]): string {
  return `{${values.map(element).join(',')}}`
}

function element(value: string | number | boolean | null): string {
  if (value === null) return 'NULL'
  return typeof value === 'string' ? `"${value.replace(/["\\]/g, '\\$&')}"` : String(value)
}
