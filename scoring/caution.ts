/** Belongs wherever a score or the word "verified" is shown, and into every export. */
export const caution =
  'Leading-order classical geometry at one point of a moduli space: no moduli are stabilised, no fluxes, orientifold or corrections are included; a verified candidate is a verified geometry, not a vacuum.'
