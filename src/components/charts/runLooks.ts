/** How runs are told apart in one drawing: by colour, by the dashes of their line, and by a letter in words. */
export const runLooks = [
  { letter: 'A', colour: 'found-fill', dash: [] },
  { letter: 'B', colour: 'run-b', dash: [12, 4] },
  { letter: 'C', colour: 'run-c', dash: [4, 3] },
  { letter: 'D', colour: 'run-d', dash: [12, 3, 2, 3] },
] as const satisfies readonly { letter: string; colour: string; dash: readonly number[] }[]
