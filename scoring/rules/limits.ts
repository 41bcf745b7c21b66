/** Limits on a rule. Each has its own message, which states the limit. */
export const RULE_LIMITS = {
  /** Characters of the text. */
  textLength: 20_000,
  /** Nodes of the syntax tree, all statements together. */
  nodes: 2_000,
  /** Operators of one statement. */
  operators: 250,
  /** Parentheses, calls, signs and exponents inside each other. */
  nesting: 100,
  /** Quantifiers and folds inside each other. */
  folds: 3,
  /** Steps of one evaluation: one step is one node of a fold's body, for one element. */
  steps: 10_000_000,
  /** Characters of a label. */
  label: 120,
  /** Issues reported for one text; the rest are dropped. */
  issues: 50,
} as const
