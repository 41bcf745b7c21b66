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

/** Definition and formula of what the pointer rests on. */
export const ruleHover = hoverTooltip(
  (view, position) => {
    const hover = hoverAt(view.state.doc.toString(), position)
    return hover && { pos: hover.from, end: hover.to, above: true, create: () => ({ dom: contentOf(hover) }) }
  },
  { hoverTime: 250 },
)
