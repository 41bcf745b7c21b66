import { setDiagnostics } from '@codemirror/lint'
import { StateEffect, StateField, type Extension } from '@codemirror/state'
import { type EditorView, ViewPlugin, type ViewUpdate } from '@codemirror/view'
import { type OwnName, type RuleReport } from '../../../scoring/index.ts'
import { diagnosticOf, withoutWordAtCursor } from './ruleLint.ts'

/** An issue at the word under the cursor waits this long: nobody is scolded in the middle of a word. */
const wordDelay = 1_000

/** Puts what the checker says into the editor. */
export const setReport = StateEffect.define<RuleReport>()

/** The latest report that came in, on this text or on one some keys ago. */
const latest = StateField.define<RuleReport | null>({
  create: () => null,
  update: (report, transaction) =>
    transaction.effects.reduce<RuleReport | null>(
      (found, effect) => (effect.is(setReport) ? effect.value : found),
      report,
    ),
})

const noNames: readonly OwnName[] = []

/** The rule's own names as the latest report knows them. */
export const namesIn = (view: Pick<EditorView, 'state'>): readonly OwnName[] =>
  view.state.field(latest, false)?.names ?? noNames

/** Underlines what the checker found, as soon as its report on the text in the editor is there. */
const underlines = ViewPlugin.fromClass(
  class {
    private timers: ReturnType<typeof setTimeout>[] = []

    constructor(private readonly view: EditorView) {}

    update(update: ViewUpdate): void {
      const arrived = update.transactions.some(({ effects }) =>
        effects.some((effect) => effect.is(setReport)),
      )
      if (!arrived && !update.docChanged) return
      this.stop()
      // Updates may not be made inside an update.
      this.timers = [setTimeout(() => this.show(false), 0), setTimeout(() => this.show(true), wordDelay)]
    }

    destroy(): void {
      this.stop()
    }

    private stop(): void {
      for (const timer of this.timers) clearTimeout(timer)
    }

    private show(all: boolean): void {
      const { state } = this.view
      const report = state.field(latest)
      const text = state.doc.toString()
      if (report?.text !== text) return
      const shown = all ? report.issues : withoutWordAtCursor(report.issues, text, state.selection.main.head)
      this.view.dispatch(
        setDiagnostics(
          state,
          shown.map((issue) => diagnosticOf(issue, text.length)),
        ),
      )
    }
  },
)

/** For a whole rule, whose reports come from elsewhere. */
export const shownReport: Extension = [latest, underlines]
