import type { SenmlFields, SenmlResolver } from '@/ingest/resolve-senml'

const QUOTE = 0x22
const COMMA = 0x2c
const COLON = 0x3a
const MINUS = 0x2d
const DOT = 0x2e
const ZERO = 0x30
const NINE = 0x39
const BACKSLASH = 0x5c
const OPEN = 0x5b
const CLOSE = 0x5d
const OPEN_BRACE = 0x7b
const CLOSE_BRACE = 0x7d

/** Powers of ten that a double holds exactly: a whole number divided by one is rounded once, as JSON's numbers are. */
const TEN = [1, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15]
const MAX_DIGITS = 15
/** So many records are read in one go, about ten milliseconds, before others get their turn. */
const RECORDS_A_TURN = 20_000

/** Thrown when the text is anything out of the ordinary: it may be wrong, or merely rare, and JSON.parse decides. */
class OutOfTheOrdinary extends Error {}

/**
 * Reads a plain SenML pack straight into a resolver, without an object a record: a backlog of weeks is a million of
 * them, and JSON.parse would make them all at once while every other request waits. Plain = an array of flat
 * objects; no escapes in texts, no nulls.
 * @returns false when the pack is not plain (and the resolver is spoilt): read it with JSON.parse instead.
 * @throws Problem from the resolver, for a record that cannot be understood.
 */
export async function scanSenml(text: string, resolver: SenmlResolver): Promise<boolean> {
  const scanner = new Scanner(text)
  try {
    scanner.expect(OPEN)
    if (scanner.peek() === CLOSE) return scanner.atEndAfter(CLOSE)
    for (let index = 0; ; index += 1) {
      const own = scanner.record()
      resolver.take(scanner.fields, index, own)
      if (scanner.peek() !== COMMA) break
      scanner.expect(COMMA)
      if (index % RECORDS_A_TURN === RECORDS_A_TURN - 1) await othersTurn()
    }
    return scanner.atEndAfter(CLOSE)
  } catch (error) {
    if (error instanceof OutOfTheOrdinary) return false
    throw error
  }
}

const othersTurn = () => new Promise<void>((resolve) => setImmediate(resolve))

class Scanner {
  /** One object for all records, so that nothing is left to be collected. */
  readonly fields: SenmlFields = {
    bn: undefined,
    bt: undefined,
    bu: undefined,
    bv: undefined,
    bver: undefined,
    n: undefined,
    u: undefined,
    v: undefined,
    vs: undefined,
    vb: undefined,
    vd: undefined,
    t: undefined,
  }
  private at = 0

  constructor(private readonly text: string) {}

  /** The next character that is not white space; NaN at the end. */
  peek(): number {
    let code = this.text.charCodeAt(this.at)
    while (code === 0x20 || code === 0x0a || code === 0x0d || code === 0x09) {
      this.at += 1
      code = this.text.charCodeAt(this.at)
    }
    return code
  }

  expect(code: number): void {
    if (this.peek() !== code) throw new OutOfTheOrdinary()
    this.at += 1
  }

  atEndAfter(code: number): boolean {
    this.expect(code)
    return Number.isNaN(this.peek())
  }

  /** Reads one record into `fields`; answers whether it has a field besides base fields. */
  record(): boolean {
    this.clear()
    this.expect(OPEN_BRACE)
    let own = false
    if (this.peek() === CLOSE_BRACE) {
      this.at += 1
      return own
    }
    for (;;) {
      if (this.field()) own = true
      if (this.peek() !== COMMA) break
      this.at += 1
    }
    this.expect(CLOSE_BRACE)
    return own
  }

  private clear(): void {
    const { fields } = this
    fields.bn = fields.bt = fields.bu = fields.bv = fields.bver = undefined
    fields.n = fields.u = fields.v = fields.vs = fields.vb = fields.vd = fields.t = undefined
  }

  /** Answers whether it is a field of the record's own. */
  private field(): boolean {
    const { fields } = this
    const key = this.string()
    this.expect(COLON)
    const value = this.value()
    switch (key) {
      case 'n':
        fields.n = value
        return true
      case 't':
        fields.t = value
        return true
      case 'u':
        fields.u = value
        return true
      case 'v':
        fields.v = value
        return true
      case 'vb':
        fields.vb = value
        return true
      case 'vs':
        fields.vs = value
        return true
      case 'vd':
        fields.vd = value
        return true
      case 'bn':
        fields.bn = value
        return false
      case 'bt':
        fields.bt = value
        return false
      case 'bu':
        fields.bu = value
        return false
      case 'bv':
        fields.bv = value
        return false
      case 'bver':
        fields.bver = value
        return false
      case 'bs':
        return false
      default:
        // A field that must be understood is refused with its name where JSON.parse reads it.
        if (key.endsWith('_')) throw new OutOfTheOrdinary()
        return true
    }
  }

  private value(): string | number | boolean {
    const code = this.peek()
    if (code === QUOTE) return this.string()
    if (code === MINUS || (code >= ZERO && code <= NINE)) return this.number()
    if (this.text.startsWith('true', this.at)) {
      this.at += 4
      return true
    }
    if (this.text.startsWith('false', this.at)) {
      this.at += 5
      return false
    }
    throw new OutOfTheOrdinary()
  }

  private string(): string {
    this.expect(QUOTE)
    const { text } = this
    const from = this.at
    for (let at = from; ; at += 1) {
      const code = text.charCodeAt(at)
      if (code === QUOTE) {
        this.at = at + 1
        return text.slice(from, at)
      }
      // Escapes, control characters and the end of the text (not a number, so not over 0x1f).
      if (code === BACKSLASH || !(code > 0x1f)) throw new OutOfTheOrdinary()
    }
  }

  /** A number of at most fifteen digits without an exponent, read exactly. */
  private number(): number {
    const { text } = this
    let at = this.at
    let code = text.charCodeAt(at)
    const negative = code === MINUS
    if (negative) code = text.charCodeAt((at += 1))
    const from = at
    let digits = 0
    let whole = 0
    let fraction = 0
    while (code >= ZERO && code <= NINE) {
      whole = whole * 10 + (code - ZERO)
      digits += 1
      code = text.charCodeAt((at += 1))
    }
    if (digits === 0 || (digits > 1 && text.charCodeAt(from) === ZERO)) throw new OutOfTheOrdinary()
    if (code === DOT) {
      code = text.charCodeAt((at += 1))
      while (code >= ZERO && code <= NINE) {
        whole = whole * 10 + (code - ZERO)
        fraction += 1
        code = text.charCodeAt((at += 1))
      }
      if (fraction === 0) throw new OutOfTheOrdinary()
    }
    if (digits + fraction > MAX_DIGITS || code === 0x65 || code === 0x45) {
      return this.longNumber()
    }
    this.at = at
    const value = whole / (TEN[fraction] ?? 1)
    return negative ? -value : value
  }

  private longNumber(): number {
    const pattern = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y
    pattern.lastIndex = this.at
    const match = pattern.exec(this.text)
    if (match === null) throw new OutOfTheOrdinary()
    this.at = pattern.lastIndex
    return Number(match[0])
  }
}
