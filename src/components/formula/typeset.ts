import katex from 'katex'
import 'katex/dist/katex.min.css'

export function typeset(tex: string, element: HTMLElement): void {
  katex.render(tex, element, { throwOnError: false, output: 'htmlAndMathml', displayMode: false })
}
