/** Typesets TeX into an element; the typesetter is loaded on first use. The TeX itself stands there until then. */
export function renderFormula(tex: string, element: HTMLElement): void {
  element.textContent = tex
  element.dataset.raw = tex
  void import('./typeset.ts').then(({ typeset }) => typeset(tex, element))
}
