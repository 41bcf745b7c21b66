import { hoverTooltip } from '@codemirror/view'
import { hoverAt, type HoverResult } from '../../../scoring/index.ts'
import { renderFormula } from '../formula/renderFormula.ts'

function contentOf(hover: HoverResult): HTMLElement {
  const box = document.createElement('div')
  box.className = 'rule-hover'
  const title = document.createElement('code')
  title.textContent = hover.title
  const text = document.createElement('p')
  text.textContent = hover.text
  box.append(title, text)
  const { entry } = hover
  if (entry?.formula) {
    const formula = document.createElement('div')
    formula.className = 'rule-hover-formula'
    renderFormula(entry.formula, formula)
    box.append(formula)
  }
  if (entry?.observable) {
    const facts = document.createElement('p')
    facts.className = 'rule-hover-facts'
    const { unit, stage, cost } = entry.observable
    facts.textContent = [entry.type, unit && `unit ${unit}`, `stage ${stage}`, `cost ${cost}`]
      .filter(Boolean)
      .join(' · ')
    box.append(facts)
  }
  return box
}

/**
 * Definition and formula of what the pointer rests on.
 * @param lead what stands before the text to make a rule of it
 */
export const hoverAfter = (lead: string) =>
  hoverTooltip(
    (view, position) => {
      const hover = hoverAt(lead + view.state.doc.toString(), lead.length + position)
      if (!hover) return null
      const [pos, end] = [hover.from - lead.length, hover.to - lead.length]
      return { pos, end, above: true, create: () => ({ dom: contentOf(hover) }) }
    },
    { hoverTime: 250 },
  )

export const ruleHover = hoverAfter('')
