/**
 * Colour scales. Both are pure lightness ramps between two theme colours, mixed in OKLab: perceptually even and
 * safe for every kind of colour vision, in the light and the dark theme alike.
 */

/** Colour at t in [0, 1] of the sequential scale. */
export function scaleColour(t: number): string {
  const percent = Math.round(Math.min(1, Math.max(0, t)) * 100)
  return `color-mix(in oklab, var(--scale-high) ${percent}%, var(--scale-low))`
}

/** Place of a positive count on a logarithmic ramp up to `most`. */
export function logPlace(count: number, most: number): number {
  return most <= 1 ? 0.55 : Math.log(count) / Math.log(most)
}

/** Colour of a 2-face by the lattice length of its dual edge; equal steps per distinct length present. */
export function dualLengthColour(length: number, lengths: readonly number[]): string {
  const place = lengths.indexOf(length)
  const percent = lengths.length <= 1 ? 0 : Math.round((100 * place) / (lengths.length - 1))
  return `color-mix(in oklab, var(--face-high) ${percent}%, var(--face-low))`
}

/** Value of a theme colour as the browser resolves it, for canvas. */
export function resolvedColour(name: string, element: Element = document.documentElement): string {
  const probe = document.createElement('span')
  probe.style.color = `var(--${name})`
  element.append(probe)
  const colour = getComputedStyle(probe).color
  probe.remove()
  return colour
}
