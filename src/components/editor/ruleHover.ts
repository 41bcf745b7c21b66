import { hoverTooltip } from '@codemirror/view'
import { hoverAt, type HoverResult } from '../../../scoring/index.ts'
import { namesIn } from './shownReport.ts'
import { renderFormula } from '../formula/renderFormula.ts'

function contentOf(hover: HoverResult): HTMLElement {
  const box = document.createElement('div')
  box.className = 'rule-hover'
  const title = document.createElement('code')
  title.textContent = hover.title
  const text = document.createElement('p')
  text.textContent = hover.text
  box.append(title, text)
  const { entry, own } = hover
  if (entry?.formula) {
    const formula = document.createElement('div')
    formula.className = 'rule-hover-formula'
    renderFormula(entry.formula, formula)
    box.append(formula)
  }
  if (entry?.observable) {
    const { source, convention, undefinedWhen } = entry.observable
    box.append(line(factsOf({ type: entry.type, ...entry.observable })))
    if (convention) box.append(line(convention))
    if (undefinedWhen) box.append(line(`Undefined: ${undefinedWhen}`))
    if (source) box.append(line(`Source: ${source}`))
  } else if (own?.type) {
    box.append(line(factsOf(own)))
  }
  return box
}

function line(text: string): HTMLElement {
  const facts = document.createElement('p')
  facts.className = 'rule-hover-facts'
  facts.textContent = text
  return facts
}

function factsOf({ type, unit, stage, cost }: Facts): string {
  const measured = unit === '1' ? 'pure number' : unit && `unit ${unit}`
  return [type, measured, stage && `stage ${stage}`, cost && `cost ${cost}`].filter(Boolean).join(' · ')
}

type Facts = Readonly<Record<'type' | 'unit' | 'stage' | 'cost', string | null>>

/**
 * Definition and formula of what the pointer rests on.
 * @param lead what stands before the text to make a rule of it
 */
export const hoverAfter = (lead: string) =>
  hoverTooltip(
    (view, position) => {
      const hover = hoverAt(lead + view.state.doc.toString(), lead.length + position, namesIn(view))
      if (!hover) return null
      const [pos, end] = [hover.from - lead.length, hover.to - lead.length]
      return { pos, end, above: true, create: () => ({ dom: contentOf(hover) }) }
    },
    { hoverTime: 250 },
  )

export const ruleHover = hoverAfter('')
