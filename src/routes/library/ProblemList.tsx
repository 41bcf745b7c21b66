const shown = 200

interface ImportProblem {
  readonly line: number | null
  readonly entry?: string
  readonly code: string
  readonly message: string
}

/** What was not imported, and why: line, place, message and code. */
export function ProblemList({ problems }: { problems: readonly ImportProblem[] }) {
  if (problems.length === 0) return null
  return (
    <section aria-labelledby="import-problems">
      <h3 id="import-problems">Not imported</h3>
      <ul
        tabIndex={0}
        aria-label="Problems, scrolls"
        className="max-h-56 overflow-y-auto break-words [overflow-wrap:anywhere]"
      >
        {problems.slice(0, shown).map((problem, index) => (
          <li key={index} className="border-b py-1.5">
            {problem.line !== null && <span className="mr-2 font-mono text-xs">line {problem.line}</span>}{' '}
            {problem.entry && <span className="mr-2 font-mono text-xs text-soft">{problem.entry}</span>}{' '}
            {problem.message} <span className="font-mono text-xs text-soft">{problem.code}</span>
          </li>
        ))}
      </ul>
      {problems.length > shown && <p className="text-xs text-soft">The first {shown} are listed.</p>}
    </section>
  )
}
