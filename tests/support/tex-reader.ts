/**
 * Reads typeset formulas back as numbers, as a person reads them on the page: what stands side by side is
 * multiplied, a fraction is a quotient, and a minus binds as loosely as a sum.
 */
import { unit } from '../../src/base/unit.ts'

/** @param letters what a letter stands for */
export function readTex(tex: string, letters: (name: string) => number): number {
  return new TexReader(tex, letters).whole()
}

const NUMBER = /\d+(?:(?:\{,\}|\\,)\d{3}(?!\d))*(?:\.\d+)?/y
const FUNCTIONS: Readonly<Record<string, (...values: readonly number[]) => number>> = {
  min: Math.min,
  max: Math.max,
  sin: Math.sin,
  cos: Math.cos,
  tan: Math.tan,
  arcsin: Math.asin,
  arccos: Math.acos,
  arctan: Math.atan,
  ln: Math.log,
  atan2: (y = 0, x = 0) => Math.atan2(y, x),
}

class TexReader {
  private at = 0
  private readonly tex: string
  private readonly letters: (name: string) => number

  constructor(tex: string, letters: (name: string) => number) {
    this.tex = tex
    this.letters = letters
  }

  whole(): number {
    const value = this.sum()
    if (this.at < this.tex.length) this.stop()
    return value
  }

  private sum(): number {
    let total = this.takes('-') ? -this.product() : this.product()
    for (;;) {
      if (this.takes('+')) total += this.product()
      else if (this.takes('-')) total -= this.product()
      else return total
    }
  }

  private product(): number {
    let result = this.factor()
    for (;;) {
      this.takes('\\,')
      if (!this.startsFactor()) return result
      result *= this.factor()
    }
  }

  private startsFactor(): boolean {
    return !/^(?:$|[+\-}]|,\\ |\\right)/.test(this.tex.slice(this.at))
  }

  private factor(): number {
    if (this.match(/\\d?frac/y)) return this.group() / this.group()
    if (this.takes('\\sqrt')) return Math.sqrt(this.group())
    if (this.takes('\\left|')) return Math.abs(this.until('\\right|'))
    if (this.takes('\\left(')) return this.until('\\right)')
    if (this.takes('\\sum ')) return this.product()
    if (this.takes('e^')) return Math.exp(this.group())
    const named = this.match(/\\operatorname\{(\w+)\}|\\(min|max|sin|cos|tan|arcsin|arccos|arctan|ln)(?![a-z])/y)
    if (named) return this.call(named[1] ?? named[2] ?? '')
    if (this.peeks('{')) return this.raised()
    const digits = this.match(NUMBER)
    if (digits) return this.quantity(Number(digits[0].replace(/\{,\}|\\,/g, '')))
    const letter = this.match(/\\?[a-z]+(?:_\{[^}]*\})?/iy)
    return letter ? this.letters(letter[0]) : this.stop()
  }

  /** `{base}^{power}`. */
  private raised(): number {
    const base = this.group()
    if (!this.takes('^')) return base
    return base ** this.group()
  }

  private call(name: string): number {
    const fn = FUNCTIONS[name]
    if (!fn || !this.takes('\\left(')) return this.stop()
    const values = [this.sum()]
    while (this.takes(',\\ ')) values.push(this.sum())
    return this.takes('\\right)') ? fn(...values) : this.stop()
  }

  /** A power of ten and a unit belong to the number before them. */
  private quantity(digits: number): number {
    const power = this.match(/\\times 10\^\{(-?\d+)\}/y)
    const size = power ? Number(`${digits}e${power[1]}`) : digits
    if (this.takes('^{\\circ}')) return (size * Math.PI) / 180
    if (this.takes('\\mathrm{\\%}')) return size / 100
    const named = this.match(/\\ \\mathrm\{((?:[^{}]|\{[^{}]*\})*)\}/y)
    if (!named) return size
    const text = (named[1] ?? '').replaceAll('{\\cdot}', '*').replace(/\^\{([\d.]+)\}/g, '^$1')
    return size * (text.startsWith('1/') ? 1 / unit(text.slice(2).replaceAll('/', '*')).scale : unit(text).scale)
  }

  private group(): number {
    if (!this.takes('{')) return this.stop()
    return this.until('}')
  }

  private until(close: string): number {
    const value = this.sum()
    return this.takes(close) ? value : this.stop()
  }

  private peeks(text: string): boolean {
    return this.tex.startsWith(text, this.at)
  }

  private takes(text: string): boolean {
    if (!this.peeks(text)) return false
    this.at += text.length
    return true
  }

  private match(pattern: RegExp): RegExpExecArray | undefined {
    pattern.lastIndex = this.at
    const found = pattern.exec(this.tex) ?? undefined
    if (found) this.at = pattern.lastIndex
    return found
  }

  private stop(): never {
    throw new Error(`cannot read ${this.tex.slice(this.at, this.at + 30)} in ${this.tex}`)
  }
}
