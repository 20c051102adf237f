/** One document that is watched: read, built anew after each change, and told to whoever listens. */
import { positionAt, positionOf, type Source, sourceOf } from '../base/span.ts'
import type { Compiled } from '../compile.ts'
import type { TextFault } from '../files.ts'
import { createRebuilder, type LivePage, type Rebuilder } from '../live.ts'
import type { Host } from '../publish.ts'
import { nothingNearby } from '../read/nearby.ts'
import { CALCULATION } from '../render/html.ts'
import { faultHtml } from '../render/html-fault.ts'
import { createTypesetter } from '../render/typeset.ts'
import { type Figures, figuresOf, noFigures, withoutFigures } from './figures.ts'
import type { Moves, Report } from './message.ts'
import { movesBetween } from './moved.ts'
import { blockAt } from './places.ts'
import { nearbyNaming, readSettled } from './reading.ts'

/** A document after a build. Its page is made when first asked for. */
export interface State {
  readonly version: number
  readonly report: Report
  readonly figures: Figures
  readonly page: () => PageParts
  /** The block that holds the last edit. */
  readonly edited: () => number | undefined
  readonly title: string
}

export interface PageParts extends LivePage {
  /** The rules for paper, apart from `style`: they name the state of the source, and a browser that is given new
   * rules for the screen sets the whole page anew. */
  readonly paper: string
}

export interface Built {
  readonly state: State
  readonly moves: Moves
  readonly ms: number
  /** What stopped the build where there is no compiled document, in words for the terminal. */
  readonly fault: { readonly source: Source; readonly fault: TextFault } | undefined
}

export interface Surroundings {
  readonly host: Host
  /** Asked to watch each file that the document names. */
  readonly watch: (file: string) => void
  /** Told after each build. */
  readonly built: (document: WatchedDocument, built: Built) => void
}

/** How long until a document that is being saved is looked at again. */
const AGAIN = 20

export class WatchedDocument {
  readonly path: string
  /** Its path as messages show it. */
  readonly shown: string
  /** Folder of it within the folder that was named. */
  readonly within: string
  state: State
  /** Of the present state; undefined where the text could not be worked. */
  compiled: Compiled | undefined
  private rebuilder: Rebuilder
  private readonly around: Surroundings
  private text: string | undefined
  private fault = ''
  private passingSince: number | undefined
  private timer: NodeJS.Timeout | undefined

  constructor(path: string, shown: string, within: string, around: Surroundings) {
    this.path = path
    this.shown = shown
    this.within = within
    this.around = around
    this.rebuilder = createRebuilder(shown, around.host)
    this.state = {
      version: 0,
      report: { state: 'waiting', errors: 0, checks: 0, failed: 0, messages: [] },
      figures: noFigures,
      page: () => this.bare('not read yet', '', ''),
      edited: () => undefined,
      title: shown,
    }
  }

  /** Reads the document and builds it if it has changed. @param anew true when a file that it names has changed */
  look(anew = false): void {
    clearTimeout(this.timer)
    this.timer = undefined
    const began = performance.now()
    const read = readSettled(this.path, this.passingSince)
    if (read === undefined) {
      this.passingSince ??= began
      this.timer = setTimeout(() => this.look(anew), AGAIN)
      return
    }
    this.passingSince = undefined
    if (!read.ok) {
      this.wait(read.because, began)
      return
    }
    if (read.value === this.text && this.fault === '' && !anew) return
    this.build(read.value, began)
  }

  close(): void {
    clearTimeout(this.timer)
  }

  private build(text: string, began: number): void {
    const before = this.text
    this.text = text
    try {
      const compiled = this.rebuilder.compile(text, nearbyNaming(this.path, this.around.watch))
      const { source, diagnostics, checks, choices } = compiled
      const errors = diagnostics.filter(({ severity }) => severity === 'error').length
      const page = once(() => withPaperApart(this.rebuilder.page(compiled, errors > 0)))
      this.fault = ''
      this.compiled = compiled
      this.settle(began, {
        report: {
          state: errors > 0 ? 'faulty' : 'sound',
          errors,
          checks: checks.length,
          failed: checks.filter(({ ok }) => !ok).length,
          messages: diagnostics.map(({ severity, rule, message, at }) => ({
            severity,
            rule,
            message,
            ...positionOf(source, at.span.start),
          })),
        },
        figures: figuresOf(compiled, this.state.figures),
        page: guarded(page, because => this.bare('fault-of-its-own', because, HELP)),
        edited: once(() =>
          before === undefined ? undefined : blockAt(compiled, editedLine(before, source), page().blocks.length),
        ),
        title:
          [choices.titleBlock.title, choices.titleBlock.project].filter(part => part !== '').join(', ') || this.shown,
      })
    } catch (error) {
      this.text = undefined
      // What it keeps from build to build may be half made.
      this.rebuilder = createRebuilder(this.shown, this.around.host)
      const because = `Platemark has a fault of its own here: ${messageOf(error)}`
      this.stop('broken', { rule: 'fault-of-its-own', message: because, help: HELP, text: '', offset: 0 }, began)
    }
  }

  /** There is no text to work: said once, and waited for. */
  private wait(fault: TextFault, began: number): void {
    this.text = undefined
    if (this.fault !== fault.message) this.stop('waiting', fault, began)
  }

  private stop(state: 'waiting' | 'broken', fault: TextFault, began: number): void {
    this.fault = fault.message
    this.compiled = undefined
    const source = sourceOf(this.shown, fault.text)
    const { rule, message, help } = fault
    const parts = once(() => this.bare(rule, message, help))
    const place = positionOf(source, fault.offset)
    this.settle(
      began,
      {
        report: {
          state,
          errors: 1,
          checks: 0,
          failed: 0,
          messages: [{ severity: 'error', rule, message, ...place }],
        },
        figures: withoutFigures(this.state.figures),
        page: parts,
        edited: () => undefined,
        title: this.state.title,
      },
      { source, fault },
    )
  }

  private settle(began: number, next: Omit<State, 'version'>, fault?: Built['fault']): void {
    const before = this.state
    this.state = { ...next, version: before.version + 1 }
    const moves = movesBetween(before.figures, next.figures)
    this.around.built(this, { state: this.state, moves, ms: performance.now() - began, fault })
  }

  /** A page with a box that says why there is no calculation, and no number at all. */
  private bare(rule: string, message: string, help: string): PageParts {
    const source = sourceOf(this.shown, '')
    const compiled = createRebuilder(this.shown, this.around.host)
    const { style, paper } = withPaperApart(compiled.page(compiled.compile('', nothingNearby), false))
    const at = { span: { start: 0, end: 1 }, text: '' }
    const box = faultHtml(
      { kind: 'fault', diagnostics: [{ rule, severity: 'error', message, help, at, also: [] }] },
      {
        source,
        typesetter: createTypesetter(),
        level: 2,
        marks: { has: () => false, within: () => [] },
        medium: 'screen',
      },
    )
    return {
      title: this.shown,
      style,
      paper,
      around: `<div class="sheet"><main>\n${CALCULATION}\n</main></div>`,
      blocks: [box],
      island: () => ({ values: [], formulas: [], pieces: [], lines: {} }),
    }
  }
}

function withPaperApart(page: LivePage): PageParts {
  const at = page.style.lastIndexOf('@page{size:')
  return at === -1 ? { ...page, paper: '' } : { ...page, style: page.style.slice(0, at), paper: page.style.slice(at) }
}

const HELP = 'Please report it with the document. The next save is tried afresh.'

/** The line of the new text at which it begins to differ from the old. */
function editedLine(before: string, source: Source): number {
  const { text } = source
  let at = 0
  while (at < before.length && at < text.length && before.charCodeAt(at) === text.charCodeAt(at)) at++
  return positionAt(source, Math.min(at, text.length)).line
}

/** Makes a thing when it is first asked for, and then lets go of what it is made of. */
function once<T>(make: () => T): () => T {
  let step: { readonly make: () => T } | { readonly value: T } = { make }
  return () => {
    if ('make' in step) step = { value: step.make() }
    return step.value
  }
}

/** A page whose making fails must not end the watch. */
const guarded = (make: () => PageParts, instead: (because: string) => PageParts): (() => PageParts) =>
  once(() => {
    try {
      return make()
    } catch (error) {
      return instead(`Platemark has a fault of its own here: ${messageOf(error)}`)
    }
  })

const messageOf = (error: unknown): string => (error instanceof Error ? error.message : String(error))
